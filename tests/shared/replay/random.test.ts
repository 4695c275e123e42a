import { describe, expect, it } from 'vitest';
import { TrialRandom } from '../../../shared/replay/random';

const draw = (seed: number, point: number, trial: number, count = 4) => {
  const random = new TrialRandom({ seed, point, trial });
  return Array.from({ length: count }, () => random.word());
};

describe('TrialRandom', () => {
  it('repeats a trial and tells any two apart', () => {
    expect(draw(1, 2, 3)).toEqual(draw(1, 2, 3));
    const first = [draw(1, 2, 3), draw(2, 2, 3), draw(1, 3, 3), draw(1, 2, 4), draw(1, 3, 2)].map(String);
    expect(new Set(first).size).toBe(5);
  });

  it('sets every bit half of the time, over neighbouring trials too', () => {
    const words = Array.from({ length: 20000 }, (_, trial) => draw(0, 0, trial, 1)[0]!);
    for (let bit = 0; bit < 32; bit++) {
      const ones = words.filter((word) => ((word >>> bit) & 1) === 1).length;
      expect(Math.abs(ones - 10000)).toBeLessThan(5 * Math.sqrt(5000));
    }
  });

  it('gives fractions in [0, 1)', () => {
    const random = new TrialRandom({ seed: 4294967295, point: 3207, trial: 9999 });
    const values = Array.from({ length: 1000 }, () => random.fraction());
    expect(Math.min(...values)).toBeGreaterThanOrEqual(0);
    expect(Math.max(...values)).toBeLessThan(1);
  });
});
