import { describe, expect, it } from 'vitest';
import { cycleSlip } from '../../../shared/budget/cycle-slip';

const slip = (rho: number, noiseBandwidthHz = 1, symbolRateBd = 1) =>
  cycleSlip({ variance: 1 / rho, noiseBandwidthHz, symbolRateBd });

describe('cycleSlip', () => {
  // A. Viterbi 1966: π²ρI0²(ρ)/2 = 7.910 / 51.29 / 352.7 at ρ = 1 / 2 / 3, times 1/BL.
  it.each([
    [1, 7.91],
    [2, 51.29],
    [3, 352.7],
  ])('takes %f: %f over the bandwidth', (rho, value) => {
    expect(Math.abs(slip(rho).seconds! / value - 1)).toBeLessThan(2e-4);
    expect(Math.abs(slip(rho, 50).seconds! / (value / 50) - 1)).toBeLessThan(2e-4);
  });

  it('counts symbols at the symbol rate', () => {
    const { seconds, symbols, rho } = slip(2, 100, 1e6);
    expect(symbols! / seconds!).toBeCloseTo(1e6, 3);
    expect(rho).toBe(2);
  });

  it('gives none beyond 1e300', () => {
    expect(slip(300).seconds).toBeLessThan(1e300);
    expect(slip(400)).toMatchObject({ seconds: null, symbols: null });
    expect(slip(1e12)).toMatchObject({ seconds: null, rho: 1e12 });
  });
});
