import { describe, expect, it } from 'vitest';
import { clockDetector } from '../../../../shared/detectors/clock';
import { timingDetector, timingLsbLog2 } from '../../../../shared/fixed-point/datapath/timing-detector';
import { clockWords } from '../../../../shared/fixed-point/words';
import { autocovariance, meanOf, received } from '../../detectors/timing-simulation';
import { gardnerLink } from '../link';

const symbols = 40_000;
const amplitude = 0.4;

describe('timingDetector', () => {
  // Seeded simulation: symbols, transmit pulse, white noise and matched filter, rounded to words of 16 bits, ±½ at 0.25
  // symbol. The mean of the integer value times its LSB is the S-curve within five standard errors and 0.5 %.
  it.each([
    ['gardner', 'QPSK', 10],
    ['gardner', '16QAM', 30],
    ['zero-crossing', 'QPSK', 10],
    ['zero-crossing', 'BPSK', 4],
    ['mueller-muller', 'QPSK', 10],
    ['mueller-muller', '16QAM', 100],
  ] as const)(
    'of %s on %s at a ratio of %i has the gain of its model',
    (detector, modulation, esN0) => {
      const signal = { ...gardnerLink.signal, modulation, sampleBits: 16, sampleFullScaleLog2: 1 };
      const words = clockWords({ ...gardnerLink, signal, clock: { ...gardnerLink.clock, detector } });
      const detect = timingDetector(words);
      const { rails } = received({ modulation, rollOff: 0.35, esN0, symbols, seed: 11 });
      const word = (at: number): [bigint, bigint] => [
        BigInt(Math.round(rails[0][at]! * amplitude * 2 ** 14)),
        BigInt(Math.round(rails[1][at]! * amplitude * 2 ** 14)),
      ];
      const samplesPerSymbol = detector === 'mueller-muller' ? 1 : 2;
      const model = clockDetector(detector, { modulation, amplitude, esN0, rollOff: 0.35, samplesPerSymbol });
      for (const early of [-0.25, 0.25]) {
        const values = Float64Array.from({ length: symbols - 64 }, (_, k) => {
          const strobe = (k + 32 - early) * 8;
          return Number(detect(word(strobe), word(strobe - 8), word(strobe - 4))) * 2 ** timingLsbLog2(words);
        });
        const spread = 5 * Math.sqrt(autocovariance(values, 0) / symbols) + 0.005 * model.noisy(0.25);
        expect(Math.abs(meanOf(values) - model.noisy(early))).toBeLessThan(spread);
      }
    },
    60_000,
  );
});
