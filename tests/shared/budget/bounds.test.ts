import { describe, expect, it } from 'vitest';
import { meanSquareBandwidth, phaseBound, timingBound } from '../../../shared/budget/bounds';

describe('bounds', () => {
  // A. D'Andrea, U. Mengali, R. Reggiannini 1994: ξ of a root-raised-cosine pulse.
  it.each([
    [0, 0.083333],
    [0.2, 0.085228],
    [0.35, 0.089135],
    [0.5, 0.095173],
    [1, 0.130691],
  ])('has ξ at roll-off %f', (rollOff, xi) => {
    expect(meanSquareBandwidth(rollOff)).toBeCloseTo(xi, 6);
  });

  // Published: BnT/γ, and 1/(8π²ξLγ) with L = 1/(2BnT).
  it('has the phase and the timing of tracking', () => {
    expect(phaseBound(0.01, 10)).toBeCloseTo(1e-3, 12);
    const symbols = 1 / (2 * 0.01);
    expect(timingBound(0.01, 10, 0.35)).toBeCloseTo(1 / (8 * Math.PI ** 2 * 0.089135 * symbols * 10), 7);
  });
});
