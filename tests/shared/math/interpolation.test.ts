import { describe, expect, it } from 'vitest';
import { interpolate } from '../../../shared/math/interpolation';

describe('interpolate', () => {
  const [x, y] = [
    [1, 2, 4],
    [10, 30, 20],
  ];

  // By hand: half way from 10 to 30; a quarter of the way from 30 to 20.
  it.each([
    [1.5, 20],
    [2.5, 27.5],
    [1, 10],
    [2, 30],
    [4, 20],
  ])('at %d is %d', (at, value) => {
    expect(interpolate(x, y, at)).toBe(value);
  });

  it('keeps its end values outside', () => {
    expect(interpolate(x, y, 0)).toBe(10);
    expect(interpolate(x, y, 5)).toBe(20);
  });

  it('is 0 without points', () => {
    expect(interpolate([], [], 1)).toBe(0);
  });
});
