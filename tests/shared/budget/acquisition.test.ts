import { describe, expect, it } from 'vitest';
import { falseLockSpacingHz, lockInOmega, unambiguousOffsetHz } from '../../../shared/budget/acquisition';

const dynamics = { damping: Math.SQRT1_2, omegaN: 100 };
/** s = sin(Mφ)/M. */
const sine = (symmetry: number) => ({ largest: 1 / symmetry, meanSquare: 1 / (2 * symmetry ** 2), powers: [] });

describe('ambiguity', () => {
  // Published: 18 kBd QPSK is unambiguous below Rs/(2M) = 2250 Hz, false locks lie at Rs/4.
  it('is half the spacing of the false locks', () => {
    expect(unambiguousOffsetHz({ symmetry: 4, symbolRateBd: 18e3, averaged: 1 })).toBe(2250);
    expect(falseLockSpacingHz(4, 18e3)).toBe(4500);
  });

  it('is no more than the first zero of an average', () => {
    expect(unambiguousOffsetHz({ symmetry: 4, symbolRateBd: 18e3, averaged: 2 })).toBe(2250);
    expect(unambiguousOffsetHz({ symmetry: 4, symbolRateBd: 18e3, averaged: 8 })).toBe(562.5);
  });
});

describe('lock-in', () => {
  // F. Gardner 2005: 2ζωn for sin φ, 2ζωn/M for sin(Mφ)/M.
  it('locks in over 2ζωn/M', () => {
    expect(lockInOmega(dynamics, sine(1))).toBeCloseTo(141.42, 2);
    expect(lockInOmega(dynamics, sine(4))).toBeCloseTo(141.42 / 4, 2);
  });
});
