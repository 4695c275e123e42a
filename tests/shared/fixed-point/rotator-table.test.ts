import { describe, expect, it } from 'vitest';
import { rotatorTable, wholeCircle } from '../../../shared/fixed-point/rotator-table';

describe('rotatorTable', () => {
  // By hand: unity is 2^10 = 1024, 1024·√½ = 724.08 and cos 22.5° = .9238795, sin 22.5° = .3826834.
  it('holds cosine and sine of the first octant to the nearest integer', () => {
    expect(rotatorTable({ phaseBits: 4, tableBits: 12 })).toEqual({ cosine: [1024, 946, 724], sine: [0, 392, 724] });
  });

  it.each([3, 4, 8, 12])('goes all the way round for %i phase bits', (phaseBits) => {
    const { cosine, sine } = wholeCircle(rotatorTable({ phaseBits, tableBits: 24 }));
    expect(cosine).toHaveLength(2 ** phaseBits);
    cosine.forEach((value, i) => {
      const angle = (2 * Math.PI * i) / 2 ** phaseBits;
      expect(Math.abs(value - 2 ** 22 * Math.cos(angle))).toBeLessThanOrEqual(0.5 + 1e-6);
      expect(Math.abs(sine[i]! - 2 ** 22 * Math.sin(angle))).toBeLessThanOrEqual(0.5 + 1e-6);
    });
  });
});
