import { describe, expect, it } from 'vitest';
import { firstToRead } from '../../../../src/components/replays/first-to-read';
import { sameCheck } from '../../../../src/components/replays/same-check';
import { check, replay, result } from '../../support/replay';

describe('firstToRead', () => {
  it('takes a refuted point before an undecided and a farther proved one', () => {
    expect(firstToRead(replay({ points: [result(0, 'pass'), result(2, 'fail'), result(3, 'undecided')] }))?.index).toBe(
      2,
    );
  });

  it('takes the nearest of several that fail: there it begins', () => {
    expect(firstToRead(replay({ points: [result(0, 'fail'), result(1, 'fail'), result(2, 'pass')] }))?.index).toBe(1);
  });

  it('takes the farthest where all are proved, and none of none', () => {
    expect(firstToRead(replay({ points: [result(2, 'pass'), result(4, 'pass')] }))?.index).toBe(4);
    expect(firstToRead(replay())).toBeUndefined();
  });
});

describe('sameCheck', () => {
  it('looks past the name and the order of keys', () => {
    const renamed = { ...check, limits: { confidence: 0.95, lockProbability: 0.99 } };
    expect(sameCheck(replay(), replay({ id: 119, check: { ...renamed, name: 'Again' } }))).toBe(true);
  });

  it.each([
    { check: { ...check, seed: 66 } },
    { check: { ...check, esN0Db: [10, 6.5] } },
    { revision: { ...replay().revision, id: 15 } },
  ])('parts replays that compute something else', (more) => {
    expect(sameCheck(replay(), replay(more))).toBe(false);
  });
});
