import { describe, expect, it } from 'vitest';
import { carrierDetector } from '../../../shared/detectors/carrier';
import { errorStatistics, spectrumAtZero } from '../../../shared/detectors/detector';
import { phaseDetector } from '../../../shared/fixed-point/datapath/phase-detector';
import { carrierWords } from '../../../shared/fixed-point/words';
import { qpskLink } from '../fixed-point/link';
import { Noise } from './noise';

const rollOff = 0.35;
const signOqpsk = (decibels: number, alpha = rollOff) =>
  carrierDetector('sign', { modulation: 'OQPSK', amplitude: 1, esN0: 10 ** (decibels / 10), rollOff: alpha });

/** Raised cosine and its root, t in symbols, from their own formulas; never asked where those are 0/0. */
const raisedCosine = (t: number): number => {
  const sinc = t === 0 ? 1 : Math.sin(Math.PI * t) / (Math.PI * t);
  return (sinc * Math.cos(Math.PI * rollOff * t)) / (1 - (2 * rollOff * t) ** 2);
};
const rootRaisedCosine = (t: number): number => {
  if (t === 0) return 1 - rollOff + (4 * rollOff) / Math.PI;
  const [wide, narrow] = [Math.PI * t * (1 + rollOff), Math.PI * t * (1 - rollOff)];
  return (Math.sin(narrow) + 4 * rollOff * t * Math.cos(wide)) / (Math.PI * t * (1 - (4 * rollOff * t) ** 2));
};

const reach = 12;
const around = Array.from({ length: 4 * reach + 1 }, (_, j) => (j - 2 * reach) / 2);

/** One rail at two samples a symbol: symbols ±1/√2 at even places, or at odd ones, and noise as the matched filter lets it. */
function rail(noise: Noise, symbols: number, odd: number, deviation: number): Float64Array {
  const length = 2 * symbols;
  const impulses = Float64Array.from({ length }, (_, k) =>
    k % 2 === odd ? Math.sign(noise.uniform() - 0.5) * Math.SQRT1_2 : 0,
  );
  const white = Float64Array.from({ length }, () => deviation * noise.normal() * Math.SQRT1_2);
  const pulse = around.map(raisedCosine);
  const filter = around.map(rootRaisedCosine);
  return impulses.map((_, k) => {
    let sum = 0;
    for (let j = 0; j < around.length; j += 1) {
      const at = k - (j - 2 * reach);
      if (at >= 0 && at < length) sum += pulse[j]! * impulses[at]! + filter[j]! * white[at]!;
    }
    return sum;
  });
}

/** Errors of the integer detector on a waveform turned by a phase, in units of the amplitude. */
function errors(symbols: number, gamma: number, phase: number): Float64Array {
  const noise = new Noise(5);
  const words = carrierWords({ ...qpskLink, signal: { ...qpskLink.signal, modulation: 'OQPSK' } });
  const value = phaseDetector(words);
  const deviation = Math.sqrt(1 / (2 * gamma));
  const [i, q] = [rail(noise, symbols, 0, deviation), rail(noise, symbols, 1, deviation)];
  const [cos, sin] = [Math.cos(phase), Math.sin(phase)];
  const fine = 2 ** 20;
  const turned = (k: number) =>
    [
      BigInt(Math.round(fine * (i[k]! * cos - q[k]! * sin))),
      BigInt(Math.round(fine * (i[k]! * sin + q[k]! * cos))),
    ] as const;
  return Float64Array.from(
    { length: symbols - 2 * reach },
    (_, k) => Number(value(turned(2 * (k + reach)), turned(2 * (k + reach) + 1), 0)) / fine,
  );
}

const meanOf = (values: Float64Array): number => values.reduce((sum, value) => sum + value, 0) / values.length;

describe('sign detector on OQPSK', () => {
  // Derived: both rails' mean magnitude less what the other rail's interference turns over:
  // 2[erf(√5)/√2 − 2·√(10/π)·e^(−5)·½(1 − 0.175)] = 1.3921; √2 without noise.
  it('has its slope at lock', () => {
    expect(signOqpsk(10).gain).toBeCloseTo(1.3921, 3);
    expect(signOqpsk(40).gain).toBeCloseTo(Math.SQRT2, 6);
  });

  // Independent: 40000 seeded symbols with coloured noise through the integer detector; four and a half deviations.
  it.each([0.2, 0.87, 1.3])('has the mean of its S-curve at %f rad', (phase) => {
    const values = errors(40_000, 10, phase);
    const deviation = Math.sqrt(meanOf(values.map((value) => value ** 2)));
    expect(Math.abs(meanOf(values) - signOqpsk(10).noisy(phase))).toBeLessThan((4.5 * deviation) / Math.sqrt(40_000));
  });

  // Independent: covariance of simulated errors, 60000 symbols, five deviations of an estimate.
  it('has the covariance of its errors', () => {
    const values = errors(60_000, 10, 0);
    const { covariance } = signOqpsk(10);
    const tolerance = ((5 * covariance![0]!) / Math.sqrt(60_000)) * Math.SQRT2;
    for (const lag of [0, 1, 2, 3]) {
      const products = values.subarray(lag).map((value, k) => value * values[k]!);
      expect(Math.abs(meanOf(products) - covariance![lag]!)).toBeLessThan(tolerance);
    }
  });

  // Derived: without noise E e² = 1 − α/2 − g²(½), and errors of a pattern sum to nought, whatever the roll-off.
  it.each([0, 0.2, 0.35, 1])('leaves no power of the pattern at frequency 0 at roll-off %f', (alpha) => {
    const { selfCovariance } = signOqpsk(20, alpha);
    const sum = selfCovariance.reduce((total, value, lag) => total + (lag ? 2 : 1) * value, 0);
    expect(Math.abs(sum)).toBeLessThan(1e-12);
    if (alpha === rollOff) expect(selfCovariance[0]).toBeCloseTo(1 - 0.175 - raisedCosine(0.5) ** 2, 12);
    expect(spectrumAtZero(signOqpsk(60, alpha))!).toBeLessThan(1e-5);
  });

  // Derived: beyond 50° the curve with noise is nearly flat, without it nearly nought: a loop hangs there.
  it('is nearly flat beyond 50°', () => {
    const { noisy, gain } = signOqpsk(10);
    expect(Math.abs(noisy(1.05) - noisy(0.96)) / 0.09 / gain).toBeLessThan(0.1);
    expect(signOqpsk(40).noisy(0.87)).toBeLessThan(0.05);
    expect(signOqpsk(40).noisy(0.87)).toBeGreaterThan(0);
  });

  it('says that its errors are correlated', () => {
    expect(errorStatistics(signOqpsk(10), 1)).toMatchObject({ memoryless: false });
  });
});
