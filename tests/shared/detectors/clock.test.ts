import { describe, expect, it } from 'vitest';
import { clockDetector, gardnerSlope } from '../../../shared/detectors/clock';

const signal = { modulation: 'QPSK', amplitude: 1, rollOff: 0.35, samplesPerSymbol: 2 } as const;

/** Raised-cosine pulse, time in symbols. */
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
    const { noisy } = clockDetector('gardner', { ...signal, rollOff });
    expect(noisy(0.2)).toBeCloseTo(Math.abs(mean(0.2)), 4);
  });

  it('goes with the square of the amplitude', () => {
    expect(clockDetector('gardner', { ...signal, amplitude: 3 }).gain).toBeCloseTo(9 * gardnerSlope(0.35), 12);
  });
});

describe('clockDetector', () => {
  it.each([
    ['mueller-muller', {}, '/clock/detector', 'mueller-muller is not worked out yet; take gardner'],
    [
      'gardner',
      { modulation: 'OQPSK' },
      '/signal/modulation',
      'clock recovery of OQPSK is not worked out yet; take QPSK',
    ],
    ['gardner', { samplesPerSymbol: 1.5 }, '/signal/samplesPerSymbol', 'gardner needs at least 2 samples per symbol'],
    ['gardner', { rollOff: 0 }, '/signal/rollOff', 'gardner has no slope at roll-off 0; take a roll-off above 0'],
  ] as const)('refuses %s on %o', (detector, change, parameter, message) => {
    const make = (): unknown => clockDetector(detector, { ...signal, ...change });
    expect(make).toThrow(expect.objectContaining({ parameter, message }));
  });

  it('gives no variance that a flat spectrum could be made of', () => {
    expect(clockDetector('gardner', signal)).toMatchObject({ covariance: null });
  });
});
