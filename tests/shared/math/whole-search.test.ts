import { describe, expect, it } from 'vitest';
import { bisectWhole, largestWhole } from '../../../shared/math/whole-search';

describe('bisectWhole', () => {
  it.each([0, 1, 37, 99, 100])('finds the first number from %i on', (first) => {
    expect(bisectWhole((k) => k >= first, 0, 100)).toBe(first);
  });
});

describe('largestWhole', () => {
  it.each([0, 3, 50, 97, 100])('finds the peak at %i between coarse points', (peak) => {
    expect(largestWhole((k) => -((k - peak) ** 2), [0, 10, 40, 70, 100])).toEqual({ at: peak, value: -0 });
  });
});
