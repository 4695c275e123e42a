import { describe, expect, it } from 'vitest';
import { logBesselI0 } from '../../../shared/math/log-bessel';

describe('logBesselI0', () => {
  // M. Abramowitz, I. Stegun, table 9.8 and (from memory of the same) I0(10); scipy.special.i0e for 30 and beyond.
  it.each([
    [0, 1],
    [1, 1.2660658778],
    [2, 2.2795853023],
    [3, 4.8807925859],
    [10, 2815.716628],
  ])('is ln of I0(%f)', (x, value) => {
    expect(Math.exp(logBesselI0(x)) / value).toBeCloseTo(1, 9);
  });

  // The integral (1/π)·∫ e^(x·cos t) dt by the trapezoid rule, which is exact to rounding on a period.
  it.each([5, 29.99, 30, 30.01, 200])('is the integral over a turn at %f', (x) => {
    let sum = 0;
    for (let i = 0; i < 400; i += 1) sum += Math.exp(x * (Math.cos((Math.PI * (i + 0.5)) / 400) - 1)) / 400;
    expect(logBesselI0(x)).toBeCloseTo(x + Math.log(sum), 11);
  });

  it('does not overflow', () => {
    expect(logBesselI0(1e9)).toBeCloseTo(1e9 - Math.log(2 * Math.PI * 1e9) / 2, 3);
  });
});
