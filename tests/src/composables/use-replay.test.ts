import { describe, expect, it } from 'vitest';
import { withEvent } from '../../../src/composables/use-replay';
import { leftText } from '../../../src/composables/use-time-left';
import { replay, result } from '../support/replay';

describe('withEvent', () => {
  it('keeps points in the order of the grid and counts one that comes twice once', () => {
    let current = replay();
    for (const index of [3, 0, 3]) current = withEvent(current, { type: 'point', point: result(index, 'pass') });
    expect(current.points.map(({ index }) => index)).toEqual([0, 3]);
    expect(current.pointsDone).toBe(2);
  });

  it('takes a new state and leaves the points', () => {
    const before = replay({ points: [result(0, 'pass')], pointsDone: 1 });
    const { points: _, ...done } = replay({ state: 'done', verdict: 'pass', pointsDone: 10 });
    expect(withEvent(before, { type: 'state', replay: done })).toMatchObject({ state: 'done', points: [{ index: 0 }] });
  });

  it('drops the points of an engine whose replay begins again', () => {
    const before = replay({ points: [result(0, 'pass')], pointsDone: 1 });
    const { points: _, ...again } = replay({ engine: '1.1.0', pointsDone: 0 });
    expect(withEvent(before, { type: 'state', replay: again }).points).toEqual([]);
  });
});

describe('leftText', () => {
  it.each([
    [14_200, 'about 15 s left'],
    [60_000, 'about 1 min left'],
    [3_600_000, 'about 60 min left'],
    [7_200_000, 'about 2 h left'],
  ])('rounds %d ms as an estimate deserves', (milliseconds, text) => {
    expect(leftText(milliseconds)).toBe(text);
  });
});
