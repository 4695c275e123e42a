import { describe, expect, it } from 'vitest';
import { lastAtLeast, logarithmicCrossings } from '../../../shared/math/crossing';

describe('logarithmicCrossings', () => {
  // y = x² + 1/x² passes 2.5 at √2 and 1/√2, by hand.
  it('finds where a curve falls and rises through a level', () => {
    const x = Array.from({ length: 33 }, (_, i) => 0.1 * 100 ** (i / 32));
    const found = logarithmicCrossings(
      x,
      x.map((at) => at ** 2 + at ** -2),
      2.5,
    );
    expect(found.map(({ rising }) => rising)).toEqual([false, true]);
    expect(found[0]!.x).toBeCloseTo(Math.SQRT1_2, 3);
    expect(found[1]!.x).toBeCloseTo(Math.SQRT2, 3);
  });

  it('passes over places without a value', () => {
    expect(logarithmicCrossings([1, 2, 3, 4], [1, null, null, 4], 2)).toHaveLength(1);
    expect(logarithmicCrossings([], [], 2)).toEqual([]);
  });
});

describe('lastAtLeast', () => {
  const range = { start: 1, least: 1e-3, most: 1e3 };
  it.each([0.004, 0.5, 1, 30, 900])('finds 1/x at 1/%f', (x) => {
    expect(lastAtLeast((at) => 1 / at, 1 / x, range)! / x).toBeCloseTo(1, 5);
  });

  it('says when all or none are', () => {
    expect(lastAtLeast((at) => 1 / at, 1e-9, range)).toBe(Infinity);
    expect(lastAtLeast((at) => 1 / at, 1e9, range)).toBeNull();
    expect(lastAtLeast(() => null, 0, range)).toBeNull();
  });
});
