import { describe, expect, it } from 'vitest';
import { exponential, onCircle, powerRatio } from '../../../shared/replay/portable-math';

const grid = (from: number, to: number) => Array.from({ length: 2001 }, (_, k) => from + ((to - from) * k) / 2000);

describe('portable mathematics', () => {
  it('agrees with the engine’s exponential within four units of the last place', () => {
    for (const x of grid(-50, 50)) expect(Math.abs(exponential(x) / Math.exp(x) - 1)).toBeLessThan(2 ** -50);
  });

  it('goes round the circle as cosine and sine do', () => {
    for (const turns of grid(-3, 3)) {
      const [c, s] = onCircle(turns);
      expect(Math.abs(c - Math.cos(2 * Math.PI * turns))).toBeLessThan(1e-14);
      expect(Math.abs(s - Math.sin(2 * Math.PI * turns))).toBeLessThan(1e-14);
    }
  });

  it('is exact on the axes', () => {
    expect([0, 0.25, 0.5, 0.75].map((turns) => onCircle(turns).map((value) => value + 0))).toEqual([
      [1, 0],
      [0, 1],
      [-1, 0],
      [0, -1],
    ]);
  });

  it.each([
    [10, 10],
    [-20, 0.01],
    [0, 1],
    [3, 1.9952623149688795],
  ])('%f dB is a ratio of %f', (levelDb, ratio) => {
    expect(powerRatio(levelDb) / ratio).toBeCloseTo(1, 14);
  });
});
