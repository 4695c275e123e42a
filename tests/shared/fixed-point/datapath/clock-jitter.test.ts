import { describe, expect, it } from 'vitest';
import { clockDetector } from '../../../../shared/detectors/clock';
import { clockDatapath } from '../../../../shared/fixed-point/datapath/clock-exact';
import { clockWords } from '../../../../shared/fixed-point/words';
import type { ClockWordsInput } from '../../../../shared/fixed-point/words';
import { received } from '../../detectors/timing-simulation';
import { gardnerLink } from '../link';

const symbols = 40_000;
const samplesPerSymbol = 4;
/** Symbols until the loop has settled. */
const settled = 1500;

/** Rice 2009, app. C, ζ = 1/√2. */
function gainsOf(noiseBandwidth: number): { g1: number; g2: number } {
  const theta = noiseBandwidth / (Math.SQRT1_2 + Math.SQRT1_2 / 2);
  const scale = 1 + Math.SQRT2 * theta + theta ** 2;
  return { g1: (2 * Math.SQRT2 * theta) / scale, g2: (4 * theta ** 2) / scale };
}

/** Variance of the phase of the linear loop for errors of such autocovariance: its impulse response, run and correlated. */
function linearVariance({ g1, g2 }: { g1: number; g2: number }, covariance: readonly number[], gain: number): number {
  let [phase, integral] = [0, 0];
  const h = Array.from({ length: 4000 }, (_, k) => {
    const error = (k === 0 ? 1 : 0) - phase;
    integral += g2 * error;
    phase += g1 * error + integral;
    return phase;
  });
  const lagged = (lag: number) => h.slice(lag).reduce((sum, value, k) => sum + value * h[k]!, 0);
  return covariance.reduce((sum, value, lag) => sum + (lag === 0 ? 1 : 2) * value * lagged(lag), 0) / gain ** 2;
}

/** Variance of the strobes' places about the middle of the eye, symbols², once settled. */
function strobeVariance(input: ClockWordsInput, rails: [Float64Array, Float64Array]): number {
  const datapath = clockDatapath(clockWords(input));
  const word = (value: number): number => Math.round(value * 2 ** 14);
  const early: number[] = [];
  for (let t = 0; t < symbols * samplesPerSymbol; t += 1) {
    // Eight values a symbol, every other one taken; the first strobe comes an eighth of a symbol early, and strobes
    // at lock lie half-way between two samples.
    const { interpolants } = datapath.step([word(rails[0][2 * t + 3] ?? 0), word(rails[1][2 * t + 3] ?? 0)]);
    for (const { kind, mu } of interpolants) {
      const place = (t - 0.5 + mu / 256) / samplesPerSymbol;
      if (kind === 'strobe') early.push(place - Math.round(place));
    }
  }
  const kept = early.slice(settled, -64);
  const mean = kept.reduce((sum, value) => sum + value, 0) / kept.length;
  // Updates between the strobes of one error leave a Gardner loop a bias that goes with its bandwidth.
  expect(Math.abs(mean)).toBeLessThan(0.01);
  return kept.reduce((sum, value) => sum + (value - mean) ** 2, 0) / kept.length;
}

describe('clockDatapath in its loop', () => {
  // Seeded simulation of the bits on 40 000 symbols, BnT 0.01, ζ = 1/√2: rms of the strobes within 10 % of linear theory
  // with the error's own colour (some 800 independent values: four standard errors).
  it.each([
    ['gardner', 'QPSK', 12],
    ['zero-crossing', 'QPSK', 12],
    ['mueller-muller', 'QPSK', 12],
    ['gardner', '16QAM', 20],
  ] as const)(
    'has the jitter of linear theory with %s on %s at %i dB',
    (detector, modulation, esN0Db) => {
      const esN0 = 10 ** (esN0Db / 10);
      const gains = gainsOf(0.01);
      const perSymbol = detector === 'mueller-muller' ? 1 : samplesPerSymbol;
      const model = clockDetector(detector, {
        modulation,
        amplitude: 1,
        esN0,
        rollOff: 0.35,
        samplesPerSymbol: perSymbol,
      });
      const { rails } = received({ modulation, rollOff: 0.35, esN0, symbols, seed: 21, stride: 1 });
      const variance = strobeVariance(
        {
          signal: { ...gardnerLink.signal, modulation, samplesPerSymbol, sampleBits: 17, sampleFullScaleLog2: 2 },
          clock: {
            ...gardnerLink.clock,
            detector,
            arithmetic: { ...gardnerLink.clock.arithmetic, errorBits: 18, errorFullScaleLog2: 4 },
          },
          detectorGain: model.gain,
          stages: [{ ...gains, untilSymbols: null, lockThreshold: null }],
        },
        rails,
      );
      const theory = linearVariance(gains, model.covariance!, model.gain);
      expect(Math.abs(Math.sqrt(variance / theory) - 1)).toBeLessThan(0.1);
    },
    120_000,
  );
});
