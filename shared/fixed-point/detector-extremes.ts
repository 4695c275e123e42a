import { nearestIndex } from '../detectors/decision-regions';
import type { CarrierWords } from '../model/words';
import { constellation } from './constellation';
import { detectorLsbLog2, powerLawShift } from './datapath/phase-detector';

export interface DetectorSignal {
  words: CarrierWords;
  /** Amplitude A, sample units. */
  amplitude: number;
  /** Largest magnitude of a sample without noise over A; |a| of the outermost points but for OQPSK. */
  peak: number;
  /** Standard deviation of the noise of one rail, sample units. */
  railNoise: number;
}

/** Detector values of one update: what the signal reaches with four standard deviations of noise, and the largest there can be. */
export interface DetectorExtremes {
  reached: number;
  worst: number;
}

/**
 * Largest magnitudes of the sum of U detector values. The signal term is the S-curve's highest point before lock,
 * over all symbols; noise adds as the square root of U, the signal U-fold.
 */
export function detectorExtremes(signal: DetectorSignal): DetectorExtremes {
  const { words } = signal;
  const symbols = words.symbolsPerUpdate;
  const { level, deviation } = reachOf(signal);
  return {
    reached: symbols * level + 4 * Math.sqrt(symbols) * deviation,
    worst: symbols * largestValue(words) * 2 ** detectorLsbLog2(words),
  };
}

/** Highest noiseless value at any phase and the deviation of the noise there. */
function reachOf({ words, amplitude, peak, railNoise }: DetectorSignal): { level: number; deviation: number } {
  const largest = amplitude * peak;
  switch (words.detector) {
    case 'costas':
      return { level: largest ** 2 / 2, deviation: Math.hypot(largest * railNoise, railNoise ** 2) };
    case 'sign':
      return {
        level: signLevel(words) * largest,
        deviation: words.modulation === 'bpsk' ? railNoise : Math.SQRT2 * railNoise,
      };
    case 'power-law':
      return powerReach(words, largest, railNoise);
    case 'decision':
      return { level: amplitude * decisionLevel(words), deviation: peak * railNoise };
    default:
      return { level: largest * peak, deviation: peak * railNoise };
  }
}

/** Rails cut by a shift go toward −∞, up to one LSB of what is left, so a magnitude can grow by the root of 2 of it. */
function powerReach(words: CarrierWords, largest: number, railNoise: number) {
  const power = words.power!;
  const cut = largest + (powerLawShift(words) > 0 ? Math.SQRT2 * 2 ** (detectorLsbLog2(words) / power) : 0);
  return { level: cut ** power, deviation: power * cut ** (power - 1) * railNoise };
}

/** On OQPSK two samples of the largest magnitude can add up; on one of QPSK both rails cannot be largest at once. */
const signLevel = ({ modulation }: CarrierWords): number => (modulation === 'oqpsk' ? 2 : 1);

/** Steps over the eighth of a turn that symmetry leaves of a constellation, of BPSK the quarter. */
const angles = 96;

/** Largest |Im(z · conj â)| of a point turned by any angle, â the nearest point, E|a|² = 1. */
function decisionLevel({ modulation, ringRatios }: CarrierWords): number {
  const points = constellation(modulation!, ringRatios);
  const radii = new Set(points.map(([i, q]) => Math.hypot(i, q).toFixed(9)));
  const errors = [...radii].flatMap((radius) =>
    Array.from({ length: angles }, (_, k) => {
      const angle = ((modulation === 'bpsk' ? 2 : 1) * Math.PI * (k + 0.5)) / (4 * angles);
      const [i, q] = [Number(radius) * Math.cos(angle), Number(radius) * Math.sin(angle)];
      const [nearI, nearQ] = points[nearestIndex(points, i, q)]!;
      return Math.abs(q * nearI - i * nearQ);
    }),
  );
  return Math.max(...errors);
}

/** Largest |X| of one symbol in its own LSB, both rails of the sample at full scale. */
function largestValue(words: CarrierWords): number {
  const rail = 2 ** (words.sampleBits - 1);
  switch (words.detector) {
    case 'costas':
      return rail ** 2;
    case 'sign':
      return words.modulation === 'bpsk' ? rail : 2 * rail;
    case 'power-law':
      return (Math.SQRT2 * rail * 2 ** -powerLawShift(words)) ** words.power!;
    default:
      // A point's reference is below twice its unit on each rail for every modulation here.
      return 2 * rail * 2 ** (words.tableBits - 1);
  }
}
