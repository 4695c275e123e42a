import { describe, expect, it } from 'vitest';
import { notablePoints, offsetsOf, pointsAt } from '../../../../src/components/replays/check-points';
import { check, result } from '../../support/replay';

describe('offsetsOf', () => {
  // By hand: 155 kHz in four steps of 38.75 kHz.
  it('spaces the offsets evenly, both ends included', () => {
    expect(offsetsOf(check)).toEqual([-77_500, -38_750, 0, 38_750, 77_500]);
  });

  it('gives the start alone for one point', () => {
    expect(offsetsOf({ ...check, carrierOffsetHz: { start: 5, stop: 9, points: 1 } })).toEqual([5]);
  });
});

describe('pointsAt', () => {
  it('finds the results of the second Es/N0 behind those of the first', () => {
    const points = pointsAt(check, 10, [result(1, 'pass'), result(6, 'fail')]);
    expect(points.map(({ index }) => index)).toEqual([5, 6, 7, 8, 9]);
    expect(points.map(({ result: found }) => found?.verdict)).toEqual([
      undefined,
      'fail',
      undefined,
      undefined,
      undefined,
    ]);
  });

  it('sorts by offset when the range runs downward', () => {
    const downward = { ...check, carrierOffsetHz: { start: 10, stop: -10, points: 3 } };
    expect(pointsAt(downward, 6.5, []).map(({ offsetHz }) => offsetHz)).toEqual([-10, 0, 10]);
  });
});

describe('notablePoints', () => {
  it('keeps both sides of every change of verdict, the ends and the middle', () => {
    const eleven = { ...check, esN0Db: [6.5], carrierOffsetHz: { start: -5, stop: 5, points: 11 } };
    const results = Array.from({ length: 11 }, (_, index) => result(index, index === 7 ? 'undecided' : 'pass'));
    expect(notablePoints(pointsAt(eleven, 6.5, results)).map(({ offsetHz }) => offsetHz)).toEqual([-5, 0, 1, 2, 3, 5]);
  });

  it('does not list a whole range of one verdict', () => {
    const eleven = { ...check, esN0Db: [6.5], carrierOffsetHz: { start: -5, stop: 5, points: 11 } };
    const results = Array.from({ length: 11 }, (_, index) => result(index, index < 4 ? 'fail' : 'pass'));
    expect(notablePoints(pointsAt(eleven, 6.5, results)).map(({ offsetHz }) => offsetHz)).toEqual([-5, -2, -1, 0, 5]);
  });
});
