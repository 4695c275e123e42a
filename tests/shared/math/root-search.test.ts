import { describe, expect, it } from 'vitest';
import { bisect, largestBetween } from '../../../shared/math/root-search';

describe('bisect', () => {
  it('finds a rising and a falling zero to the last bits', () => {
    expect(bisect((x) => x * x - 2, 1, 2)).toBeCloseTo(Math.SQRT2, 15);
    expect(bisect((x) => Math.cos(x), 1, 2)).toBeCloseTo(Math.PI / 2, 15);
  });
});

describe('largestBetween', () => {
  it('finds a maximum', () => {
    const top = largestBetween((x) => x * Math.exp(-x), 0, 4);
    expect(top.x).toBeCloseTo(1, 6);
    expect(top.value).toBeCloseTo(1 / Math.E, 12);
  });
});
