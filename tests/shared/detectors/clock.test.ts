import { describe, expect, it } from 'vitest';
import { clockDetector, earlyLateSlope, gardnerSlope } from '../../../shared/detectors/clock';
import { autocovariance, meanOf, received, timingErrors } from './timing-simulation';

const detectors = ['gardner', 'zero-crossing', 'mueller-muller', 'early-late'] as const;
type Detector = (typeof detectors)[number];
type Signal = Parameters<typeof clockDetector>[1];

const qpsk: Signal = { modulation: 'QPSK', amplitude: 1, esN0: 10, rollOff: 0.35, samplesPerSymbol: 2 };
const model = (detector: Detector, change: Partial<Signal> = {}) =>
  clockDetector(detector, { ...qpsk, ...(detector === 'mueller-muller' && { samplesPerSymbol: 1 }), ...change });

/** Raised-cosine pulse, time in symbols, the textbook form. */
function pulse(t: number, rollOff: number): number {
  const edge = 1 - (2 * rollOff * t) ** 2;
  const sinc = t === 0 ? 1 : Math.sin(Math.PI * t) / (Math.PI * t);
  return Math.abs(edge) < 1e-9 ? (sinc * Math.PI) / 4 : (sinc * Math.cos(Math.PI * rollOff * t)) / edge;
}

describe('gardnerSlope', () => {
  // F. Gardner 1986.
  it.each([
    [0.2, 0.62428],
    [0.35, 1.07801],
    [0.5, 1.50849],
    [1, 2.66667],
  ])('is that of Gardner at roll-off %f', (rollOff, slope) => {
    expect(gardnerSlope(rollOff)).toBeCloseTo(slope, 5);
    expect(model('gardner', { rollOff }).gain).toBeCloseTo(slope, 5);
  });

  // Independent: for random data E m*(y′ − y) = Σ g(n − ½ − τ)·[g(n − 1 − τ) − g(n − τ)], both rails added.
  it.each([0.35, 0.5, 1])('is the slope of the mean over random data at roll-off %f', (rollOff) => {
    const mean = (late: number): number => {
      let sum = 0;
      for (let n = -400; n <= 400; n += 1) {
        sum += pulse(n - 0.5 + late, rollOff) * (pulse(n - 1 + late, rollOff) - pulse(n + late, rollOff));
      }
      return sum;
    };
    expect(Math.abs((mean(1e-4) - mean(-1e-4)) / 2e-4)).toBeCloseTo(gardnerSlope(rollOff), 4);
    expect(model('gardner', { rollOff }).noisy(0.2)).toBeCloseTo(Math.abs(mean(0.2)), 4);
  });
});

describe('earlyLateSlope', () => {
  // Independent: E|y(¼ − x)|² − |y(−¼ − x)|² = Σ g²(n + ¼ − x) − g²(n − ¼ − x). Published: πα sin 2πδ, δ = ¼.
  it.each([0.2, 0.35, 1])('is the slope of the mean over random data at roll-off %f', (rollOff) => {
    const mean = (x: number): number => {
      let sum = 0;
      for (let n = -400; n <= 400; n += 1) {
        sum += pulse(n + 0.25 - x, rollOff) ** 2 - pulse(n - 0.25 - x, rollOff) ** 2;
      }
      return sum;
    };
    expect((mean(1e-4) - mean(-1e-4)) / 2e-4).toBeCloseTo(Math.PI * rollOff, 4);
    expect(earlyLateSlope(rollOff)).toBeCloseTo(Math.PI * rollOff, 12);
    expect(model('early-late', { rollOff }).noisy(0.2)).toBeCloseTo(mean(0.2), 6);
  });
});

describe('clockDetector', () => {
  // K. Mueller, M. Müller 1976: 2 cos(πα)/(1 − 4α²); derived: 2|g′(½)|. Signs of QPSK rails: √2 times that.
  it.each([
    [0.2, 2.57004, 1.92623],
    [0.35, 2.61711, 1.78035],
    [0.5, 2.6859, Math.PI / 2],
    [1, 3, 0.66667],
  ])('has the slopes without noise at roll-off %f', (rollOff, zeroCrossing, muellerMuller) => {
    for (const [modulation, scale] of [
      ['BPSK', 1],
      ['QPSK', Math.SQRT2],
      // By hand: the rails of 16QAM are ±1 and ±3 over √10, E|a| = 2/√10 each.
      ['16QAM', 4 / Math.sqrt(10)],
    ] as const) {
      const change = { rollOff, modulation, amplitude: 1.5 };
      expect(model('zero-crossing', change).gainWithoutNoise / 1.5).toBeCloseTo(scale * zeroCrossing, 4);
      expect(model('mueller-muller', change).gainWithoutNoise / 1.5).toBeCloseTo(scale * muellerMuller, 4);
    }
  });

  // Derived (reference page): decisions lower the slope at 5 and 10 dB, α = .35, QPSK.
  it.each([
    ['zero-crossing', 0.755, 0.987],
    ['mueller-muller', 0.633, 0.978],
  ] as const)('lets wrong decisions lower the slope of %s', (detector, at5, at10) => {
    const share = (esN0Db: number): number => {
      const { gain, gainWithoutNoise } = model(detector, { esN0: 10 ** (esN0Db / 10) });
      return gain / gainWithoutNoise;
    };
    expect(Math.abs(share(5) - at5)).toBeLessThan(0.005);
    expect(Math.abs(share(10) - at10)).toBeLessThan(0.005);
  });

  // Seeded simulation: symbols, transmit pulse, white noise, matched filter; five standard errors and 0.5 % of the peak.
  it.each([
    ['QPSK', 3, 0.35],
    ['QPSK', 100, 0.2],
    ['BPSK', 5, 0.35],
    ['16QAM', 30, 0.35],
    ['16APSK', 100, 0.5],
    ['64QAM', 100, 0.35],
  ] as const)(
    'has the S-curve of a simulation: %s at a ratio of %i, roll-off %f',
    (modulation, esN0, rollOff) => {
      const symbols = 30_000;
      const signal = received({ modulation, rollOff, esN0, symbols, seed: 7 });
      for (const detector of detectors) {
        const { noisy } = model(detector, { modulation, esN0, rollOff });
        for (const early of [-0.25, 0, 0.25, 0.5]) {
          const errors = timingErrors(signal, detector, early);
          const spread = 5 * Math.sqrt(autocovariance(errors, 0) / symbols) + 0.005 * noisy(0.25);
          expect(Math.abs(meanOf(errors) - noisy(early)), `${detector} at ${early}`).toBeLessThan(spread);
        }
      }
    },
    60_000,
  );

  it('has the curve without noise that signs without errors make', () => {
    const symbols = 30_000;
    for (const modulation of ['QPSK', '16QAM'] as const) {
      const signal = received({ modulation, rollOff: 0.35, esN0: Infinity, symbols, seed: 8 });
      for (const detector of ['zero-crossing', 'mueller-muller'] as const) {
        const { noiseless } = model(detector, { modulation });
        for (const early of [0.25, -0.25]) {
          const errors = timingErrors(signal, detector, early);
          expect(Math.abs(meanOf(errors) / noiseless(early) - 1)).toBeLessThan(0.03);
        }
      }
    }
  }, 60_000);

  it('has a curve that is odd, of one symbol’s period, and starts with its slope', () => {
    for (const detector of detectors) {
      for (const modulation of ['BPSK', 'QPSK', '16QAM', '64QAM', '16APSK'] as const) {
        for (const [rollOff, esN0] of [
          [0.05, 3],
          [0.35, 10],
          [1, 100],
        ] as const) {
          const { gain, noisy, period } = model(detector, { modulation, rollOff, esN0 });
          expect(period).toBe(1);
          expect(noisy(1e-6) / 1e-6 / gain).toBeCloseTo(1, 3);
          expect(noisy(-0.3)).toBeCloseTo(-noisy(0.3), 12);
          expect(noisy(1.3)).toBeCloseTo(noisy(0.3), 12);
        }
      }
    }
  });

  // Independent: random 8PSK rails through the textbook pulse, 0.01 symbol early, no noise. Rails of 0 take their sign
  // from the offset itself, and the error comes out with the wrong sign.
  it('would lead away from lock on the signs of 8PSK', () => {
    let state = 12345;
    const level = (): number => {
      state = (Math.imul(state, 1664525) + 1013904223) | 0;
      return Math.cos((Math.PI / 4) * (state >>> 29));
    };
    let sum = 0;
    for (let trial = 0; trial < 4000; trial += 1) {
      const a = Array.from({ length: 40 }, level).map((value) => (Math.abs(value) < 1e-9 ? 0 : value));
      const at = (t: number): number => a.reduce((total, value, j) => total + value * pulse(t - j, 0.35), 0);
      const [before, now] = [at(19 - 0.01), at(20 - 0.01)];
      sum += Math.sign(before) * now - Math.sign(now) * before;
    }
    expect(sum / 4000).toBeLessThan(0);
  });

  it('goes with the square of the amplitude, or with the amplitude', () => {
    for (const detector of detectors) {
      const [one, three] = [model(detector), model(detector, { amplitude: 3 })];
      expect(three.gain / one.gain).toBeCloseTo(3 ** one.amplitudeExponent, 9);
      expect(three.noisy(0.2) / one.noisy(0.2)).toBeCloseTo(3 ** one.amplitudeExponent, 9);
      expect(one.amplitudeExponent).toBe(detector === 'gardner' || detector === 'early-late' ? 2 : 1);
    }
  });

  it.each([
    [
      'gardner',
      { modulation: 'OQPSK' },
      '/signal/modulation',
      'one strobe takes both rails, and those of OQPSK are half a symbol apart: their slopes cancel; take QPSK, or plan the carrier loop alone',
    ],
    [
      'gardner',
      { samplesPerSymbol: 1.5 },
      '/signal/samplesPerSymbol',
      'gardner needs at least 2 samples per symbol; take 2, or mueller-muller with fewer',
    ],
    [
      'gardner',
      { rollOff: 0 },
      '/signal/rollOff',
      'gardner has no slope at roll-off 0; take a roll-off above 0, or zero-crossing',
    ],
    [
      'early-late',
      { rollOff: 0 },
      '/signal/rollOff',
      'early-late has no slope at roll-off 0; take a roll-off above 0, or zero-crossing',
    ],
    [
      'mueller-muller',
      { samplesPerSymbol: 2 },
      '/clock/detector',
      'mueller-muller takes one sample per symbol; at 2 samples per symbol take gardner or zero-crossing',
    ],
    [
      'zero-crossing',
      { modulation: '8PSK' },
      '/clock/detector',
      'zero-crossing takes the sign of each rail, and 8PSK has points with a rail of 0; take gardner',
    ],
    [
      'mueller-muller',
      { esN0: 0.05 },
      '/signal/esN0Db',
      'at this Es/N0 the signs of QPSK leave mueller-muller no slope; take gardner',
    ],
  ] as const)('refuses %s on %o', (detector, change, parameter, message) => {
    expect(() => model(detector, change)).toThrow(expect.objectContaining({ parameter, message }));
  });

  it('works at roll-off 0 where signs decide', () => {
    // By hand: sinc′(½) = −4/π, sinc′(1) = −1.
    expect(model('zero-crossing', { rollOff: 0 }).gainWithoutNoise).toBeCloseTo((Math.SQRT2 * 8) / Math.PI, 12);
    expect(model('mueller-muller', { rollOff: 0 }).gainWithoutNoise).toBeCloseTo(2 * Math.SQRT2, 12);
  });
});
