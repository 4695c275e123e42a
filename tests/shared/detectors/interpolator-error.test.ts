import { describe, expect, it } from 'vitest';
import { interpolatorTaps } from '../../../shared/detectors/interpolator';
import { interpolatorError } from '../../../shared/detectors/interpolator-error';
import { interpolatorTable } from '../../../shared/fixed-point/interpolator-table';

const kinds = ['linear', 'parabolic', 'cubic', 'polyphase'] as const;
type Kind = (typeof kinds)[number];

const errorOf = (interpolator: Kind, samplesPerSymbol: number, { rollOff = 0.35, tableBits = 12 } = {}) =>
  interpolatorError({ interpolator, rollOff, samplesPerSymbol, fractionBits: 8, tableBits });

/** The textbook raised-cosine pulse. */
function pulse(t: number, rollOff: number): number {
  const edge = 1 - (2 * rollOff * t) ** 2;
  const sinc = t === 0 ? 1 : Math.sin(Math.PI * t) / (Math.PI * t);
  return Math.abs(edge) < 1e-9 ? (sinc * Math.PI) / 4 : (sinc * Math.cos(Math.PI * rollOff * t)) / edge;
}

/** Signal over error in dB of `taps`, which see a fraction μ of each of many random signals and are to give it at `at(μ)`. */
function measured(
  samplesPerSymbol: number,
  taps: (mu: number) => readonly number[],
  at: (mu: number) => number = (mu) => mu,
): number {
  let state = 99;
  const random = (): number => {
    state = (Math.imul(state, 1664525) + 1013904223) | 0;
    return (state >>> 0) / 2 ** 32;
  };
  let [signal, error] = [0, 0];
  for (let trial = 0; trial < 6000; trial += 1) {
    const symbols = Array.from({ length: 41 }, () => (random() < 0.5 ? -1 : 1));
    const start = 20 + random();
    const x = (samples: number): number =>
      symbols.reduce((sum, a, k) => sum + a * pulse(start + samples / samplesPerSymbol - k, 0.35), 0);
    const mu = random();
    const h = taps(mu);
    const given = [-1, 0, 1, 2].reduce((sum, n, i) => sum + h[i]! * x(n), 0);
    const wanted = x(at(mu));
    signal += wanted ** 2;
    error += (given - wanted) ** 2;
  }
  return 10 * Math.log10(signal / error);
}

describe('interpolatorError', () => {
  // Derived (reference page): spectral integral, random data, α = .35, ±.1 dB.
  it.each([
    [2, [21.1, 27.5, 31.4]],
    [4, [32.9, 34.3, 54.3]],
    [8, [44.8, 45.2, 78.1]],
  ])('has the published signal over error at %i samples per symbol', (samplesPerSymbol, decibels) => {
    decibels.forEach((expected, i) => {
      expect(Math.abs(errorOf(kinds[i]!, samplesPerSymbol).signalOverErrorDb - expected)).toBeLessThan(0.1);
    });
  });

  // Derived (reference page): 2 samples per symbol, f = (1 + α)/2.
  it('has the published worst error over the band', () => {
    [-5.8, -17.1, -9.8].forEach((expected, i) => {
      expect(Math.abs(errorOf(kinds[i]!, 2).worstErrorDb - expected)).toBeLessThan(0.1);
    });
  });

  // Independent: random data through the textbook pulse, interpolated in time; 6000 trials, 0.4 dB.
  it.each(kinds)('of %s is that of random data in time', (kind) => {
    const taps = interpolatorTaps(kind, { rollOff: 0.35, samplesPerSymbol: 2 });
    expect(Math.abs(measured(2, taps) - errorOf(kind, 2).signalOverErrorDb)).toBeLessThan(0.4);
  });

  // Independent: the same through the datapath's own table, which takes ⌊256μ⌋ for μ; half a step is a constant delay.
  it.each([
    ['cubic', 8, 12],
    ['cubic', 4, 8],
    ['linear', 8, 6],
    ['cubic', 4, 12],
  ] as const)(
    'of the table of %s, %i samples per symbol, %i bits is that in time',
    (kind, samplesPerSymbol, tableBits) => {
      const words = { interpolator: kind, tableBits, counter: { fractionBits: 8 } };
      const { coefficients } = interpolatorTable(words);
      const table = (mu: number) => coefficients[Math.floor(256 * mu)]!.map((tap) => tap / 2 ** (tableBits - 2));
      const { tableSignalOverErrorDb } = errorOf(kind, samplesPerSymbol, { tableBits });
      const inTime = measured(samplesPerSymbol, table, (mu) => mu - 1 / 512);
      expect(Math.abs(inTime - tableSignalOverErrorDb)).toBeLessThan(0.4);
    },
  );

  // By hand: linear at ½, |1 − cos πf|, f = ¼ cycles per sample: 1 − 1/√2; over the fractions, f = ½: |1 − μ − μ·(−1) …|.
  it('draws the error over frequency', () => {
    const { frequency, errorDb, bandEdge } = errorOf('linear', 2);
    expect(frequency).toHaveLength(49);
    expect(frequency.at(-1)).toBe(0.5);
    expect(errorDb[0]).toBeNull();
    expect(bandEdge).toBeCloseTo(0.3375, 12);
    // f = ½: e^(jπμ) − (1 − 2μ), mean over μ of 1 + (1 − 2μ)² − 2(1 − 2μ) cos πμ = 4/3 − 8/π².
    expect(errorDb.at(-1)).toBeCloseTo(10 * Math.log10(4 / 3 - 8 / Math.PI ** 2), 6);
  });

  it('gives finite numbers over the whole range of a plan', () => {
    for (const kind of kinds) {
      for (const samplesPerSymbol of [1, 1.5, 2, 7.3, 64]) {
        for (const rollOff of [0, 1e-6, 1]) {
          const { errorDb, frequency, ...numbers } = errorOf(kind, samplesPerSymbol, { rollOff, tableBits: 4 });
          expect(Object.values(numbers).every(Number.isFinite)).toBe(true);
          expect([...errorDb, ...frequency].every((value) => value === null || Number.isFinite(value))).toBe(true);
        }
      }
    }
  });
});
