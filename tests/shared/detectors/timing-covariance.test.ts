import { describe, expect, it } from 'vitest';
import { clockDetector } from '../../../shared/detectors/clock';
import { spectrumAtZero } from '../../../shared/detectors/detector';
import { autocovariance, received, timingErrors } from './timing-simulation';

const detectors = ['gardner', 'zero-crossing', 'mueller-muller', 'early-late'] as const;
type Detector = (typeof detectors)[number];
type Signal = Parameters<typeof clockDetector>[1];

const qpsk: Signal = { modulation: 'QPSK', amplitude: 1, esN0: 10, rollOff: 0.35, samplesPerSymbol: 2 };
const fitting = (detector: Detector, signal: Signal): Signal =>
  detector === 'mueller-muller' ? { ...signal, samplesPerSymbol: 1 } : signal;
const model = (detector: Detector, signal: Signal) => clockDetector(detector, fitting(detector, signal));

/** Phase of a loop of order 2 after one error of 1, ζ = 1/√2, run as a difference equation. */
function impulseResponse(noiseBandwidth: number): number[] {
  const theta = noiseBandwidth / (Math.SQRT1_2 + Math.SQRT1_2 / 2);
  const scale = 1 + Math.SQRT2 * theta + theta ** 2;
  const [g1, g2] = [(2 * Math.SQRT2 * theta) / scale, (4 * theta ** 2) / scale];
  let [phase, integral] = [0, 0];
  return Array.from({ length: 8000 }, (_, k) => {
    const error = (k === 0 ? 1 : 0) - phase;
    integral += g2 * error;
    phase += g1 * error + integral;
    return phase;
  });
}

/** Variance of the loop's phase for errors of such autocovariance, and for white errors of variance 1. */
function throughLoop(covariance: readonly number[], noiseBandwidth: number): { coloured: number; white: number } {
  const h = impulseResponse(noiseBandwidth);
  const lagged = (lag: number) => h.slice(lag).reduce((sum, value, k) => sum + value * h[k]!, 0);
  const coloured = covariance.reduce((sum, value, lag) => sum + (lag === 0 ? 1 : 2) * value * lagged(lag), 0);
  return { coloured, white: lagged(0) };
}

describe('timingCovariance', () => {
  // Derived (reference page of the check values): density of the error over its variance at 5, 10, 20 dB, α = .35, and
  // the variance in a loop over the timing bound, ξ = .089135, with the slope that the detector has without noise. They
  // were measured with a resolution of a narrow loop, BnT = 0.0085, which sees a little beside the null at 0.
  it.each([
    ['gardner', [0.2, 0.16, 0.07], [2.8, 2.5, 3.3]],
    ['zero-crossing', [0.84, 0.64, 0.17], [0.95, 1.04, 1.2]],
    ['mueller-muller', [1, 0.99, 0.99], [2, 2.2, 2.2]],
  ] as const)('of %s is coloured as published', (detector, colours, floors) => {
    [5, 10, 20].forEach((esN0Db, i) => {
      const esN0 = 10 ** (esN0Db / 10);
      const { covariance, gainWithoutNoise } = model(detector, { ...qpsk, esN0 });
      const { coloured, white } = throughLoop(covariance!, 0.0085);
      expect(Math.abs(coloured / white / covariance![0]! - colours[i]!)).toBeLessThan(0.03 * colours[i]! + 0.005);
      const floor = (coloured / gainWithoutNoise ** 2 / white) * 8 * Math.PI ** 2 * 0.089135 * esN0;
      expect(Math.abs(floor / floors[i]! - 1)).toBeLessThan(0.04);
    });
  });

  // Seeded simulation, 40 000 symbols: the variance within 4 %, each other value within 2 % of it.
  it.each([
    ['QPSK', 10],
    ['16QAM', 30],
    ['16APSK', 20],
    ['BPSK', 3],
    ['8PSK', 100],
  ] as const)(
    'of %s at a ratio of %i is that of a simulation',
    (modulation, esN0) => {
      const signal = received({ modulation, rollOff: 0.35, esN0, symbols: 40_000, seed: 3 });
      for (const detector of detectors) {
        if (modulation === '8PSK' && detector !== 'gardner' && detector !== 'early-late') continue;
        const covariance = model(detector, { ...qpsk, modulation, esN0 }).covariance!;
        const errors = timingErrors(signal, detector, 0);
        for (const lag of [0, 1, 2, 3, 4]) {
          const off = Math.abs(autocovariance(errors, lag) - (covariance[lag] ?? 0));
          expect(off / covariance[0]!, `${detector}, lag ${lag}`).toBeLessThan(lag === 0 ? 0.04 : 0.02);
        }
      }
    },
    60_000,
  );

  it('without noise is that of the pattern alone', () => {
    const signal = received({ modulation: '16QAM', rollOff: 0.5, esN0: Infinity, symbols: 40_000, seed: 4 });
    for (const detector of detectors) {
      const { selfCovariance } = model(detector, { ...qpsk, modulation: '16QAM', rollOff: 0.5, esN0: 100 });
      const errors = timingErrors(signal, detector, 0);
      for (const lag of [0, 1, 2]) {
        const off = Math.abs(autocovariance(errors, lag) - (selfCovariance[lag] ?? 0));
        expect(off / selfCovariance[0]!, `${detector}, lag ${lag}`).toBeLessThan(0.03);
      }
    }
  }, 60_000);

  // Derived: Σ_k m_k(y_(k−1) − y_k) leaves h(b + ½ − a) − h(b − ½ − a) for each pair of symbols, which cancels with
  // that of the pair turned round: the pattern of a Gardner detector has no density at 0.
  it.each(['gardner', 'zero-crossing'] as const)('of the pattern alone has no density at 0 with %s', (detector) => {
    for (const rollOff of [0.2, 0.35, 0.7]) {
      const { selfCovariance } = model(detector, { ...qpsk, rollOff });
      const density = spectrumAtZero({ ...model(detector, qpsk), covariance: selfCovariance })!;
      expect(Math.abs(density / selfCovariance[0]!)).toBeLessThan(1e-5);
    }
  });

  // By hand: with both rails ±1/√2 and no noise ŝ′y − ŝy′ is (|y| − |y′|)·ŝŝ′ = 0.
  it('has no pattern noise with Mueller–Müller on QPSK', () => {
    expect(model('mueller-muller', qpsk).selfCovariance).toEqual([]);
  });

  it('is that of an autocorrelation: nowhere negative in its spectrum', () => {
    for (const modulation of ['BPSK', 'QPSK', '16QAM', '64QAM', '16APSK'] as const) {
      for (const detector of detectors) {
        for (const [rollOff, esN0] of [
          [0.1, 3],
          [0.35, 1000],
          [1, 30],
        ] as const) {
          const { covariance } = model(detector, { ...qpsk, modulation, rollOff, esN0 });
          for (let f = 0; f <= 0.5; f += 1 / 64) {
            const density = covariance!.reduce(
              (sum, value, lag) => sum + (lag === 0 ? 1 : 2) * value * Math.cos(2 * Math.PI * f * lag),
              0,
            );
            expect(density / covariance![0]!).toBeGreaterThan(-1e-4);
          }
        }
      }
    }
  });

  it('goes with the fourth power of the amplitude where the slope goes with the second', () => {
    const [one, three] = [1, 3].map((amplitude) => model('gardner', { ...qpsk, amplitude }).covariance!) as [
      readonly number[],
      readonly number[],
    ];
    expect(three[1]! / one[1]!).toBeCloseTo(81, 9);
    const [first, second] = [1, 3].map((amplitude) => model('zero-crossing', { ...qpsk, amplitude }).covariance![0]!);
    expect(second! / first!).toBeCloseTo(9, 12);
  });
});
