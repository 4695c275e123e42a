import type { CarrierWords } from '../model/words';
import { detectorLsbLog2, powerLawShift } from './datapath/phase-detector';

export interface DetectorSignal {
  words: CarrierWords;
  /** Amplitude A, sample units. */
  amplitude: number;
  /** Largest |a|, E|a|² = 1. */
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
      return words.modulation === 'bpsk'
        ? { level: largest, deviation: railNoise }
        : { level: largest, deviation: Math.SQRT2 * railNoise };
    case 'power-law':
      return { level: largest ** words.power!, deviation: words.power! * largest ** (words.power! - 1) * railNoise };
    default:
      return { level: largest * peak, deviation: peak * railNoise };
  }
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
