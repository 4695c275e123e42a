import { describe, expect, it } from 'vitest';
import { carrierDetector } from '../../../shared/detectors/carrier';
import { varianceOf } from '../../../shared/detectors/detector';
import type { Modulation } from '../../../shared/detectors/modulations';

const powerLaw = (modulation: Modulation, decibels: number, amplitude = 1) =>
  carrierDetector('power-law', { modulation, amplitude, esN0: 10 ** (decibels / 10), rollOff: 0.35 });

describe('power-law detector', () => {
  // Derived: var e/Kd² over 1/(2γ) at 10 dB, (Σ C(M,k)² k! γ^−k − 1)·γ/M².
  it.each([
    ['BPSK', 1.05, 0.005],
    ['QPSK', 1.51, 0.005],
    ['8PSK', 8.9, 0.05],
  ] as const)('on %s has %f times the variance of known symbols', (modulation, excess, tolerance) => {
    const model = powerLaw(modulation, 10, 1.3);
    expect(Math.abs((varianceOf(model)! / model.gain ** 2) * 20 - excess)).toBeLessThan(tolerance);
  });

  // Derived: Im(z^M) is not divided by M in the datapath, so the slope is M·A^M |E a^M|; |E a⁴| = 0.68 for 16QAM by hand.
  it('has the slope of the power as the datapath takes it', () => {
    expect(powerLaw('QPSK', 3, 0.5).gain).toBeCloseTo(4 * 0.5 ** 4, 14);
    expect(powerLaw('8PSK', 3, 1.5).gain).toBeCloseTo(8 * 1.5 ** 8, 10);
    expect(powerLaw('16QAM', 3).gain).toBeCloseTo(4 * 0.68, 12);
  });

  // By hand: (1 + 3j)⁴ = 28 − 96j, so half of the 16 points have (Im a⁴)² = 0.96², the others none.
  it('leaves the pattern of 16QAM without noise, none of PSK', () => {
    expect(powerLaw('16QAM', 20).selfCovariance[0]).toBeCloseTo(0.96 ** 2 / 2, 12);
    expect(varianceOf(powerLaw('16QAM', 90))).toBeCloseTo(0.96 ** 2 / 2, 6);
    expect(powerLaw('8PSK', 20).selfCovariance).toEqual([]);
  });
});
