import { describe, expect, it } from 'vitest';
import {
  jitterFigure,
  levelGroups,
  nearOneFigure,
  offsetTicks,
  shareFigure,
  timeFigure,
} from '../../../../src/components/replays/lock-figures';
import { offsetScale } from '../../../../src/components/replays/offset-scale';
import { check, replay, result } from '../../support/replay';

const scale = offsetScale([-77_500, 0, 77_500]);
const input = {
  replay: replay({ points: [result(0, 'fail'), result(1, 'pass'), result(2, 'undecided')] }),
  scale,
  requiredHz: 77_500,
};
const group = [6.5, 10];

describe('shareFigure', () => {
  it('draws each result with its interval, an undecided one hollow', () => {
    const { markers } = shareFigure(input, group);
    expect(markers[0]).toMatchObject({ x: -77.5, y: 0.965, low: 0.942, high: 0.9807, hollow: false, tone: 'track' });
    expect(markers[2]).toMatchObject({ x: 0, low: 0.9862, hollow: true, undecided: true });
  });

  it('lays points that have not run on the axis and names them once for each Es/N0', () => {
    const waiting = shareFigure(input, group).markers.filter(({ y }) => y === 0);
    expect(waiting).toHaveLength(2 + 5);
    expect(waiting.filter((marker) => 'label' in marker)).toMatchObject([
      { x: 77.5, label: '6.5 dB not run' },
      { x: 77.5, label: '10 dB not run', tone: 'acquire' },
    ]);
  });

  it('shades the range that the plan asks for, cut to what the check covers', () => {
    expect(shareFigure(input, group).bands).toEqual([{ from: -77.5, to: 77.5, label: 'required ±77.5' }]);
    expect(shareFigure({ ...input, requiredHz: 90_000 }, group).bands[0]).toMatchObject({ from: -77.5, to: 77.5 });
    expect(shareFigure({ ...input, requiredHz: 0 }, group).bands).toEqual([]);
  });
});

describe('nearOneFigure', () => {
  it('cuts an interval at the edge and leaves out what lies below it', () => {
    const low = result(3, 'fail', { lockProbability: { estimate: 0.5, lower: 0.45, upper: 0.55 } });
    const { markers, y } = nearOneFigure({ ...input, replay: replay({ points: [result(0, 'fail'), low] }) }, group);
    expect(y.domain![0]).toBeCloseTo(0.94, 12);
    expect(markers).toHaveLength(1);
    expect(markers[0]!.low).toBeCloseTo(0.942, 12);
  });
});

describe('timeFigure', () => {
  it('draws the median and the band to the 95th percentile of the trials that locked', () => {
    const points = [result(0, 'pass'), result(1, 'fail', { lockTimeSymbols: null })];
    const figure = timeFigure({ ...input, replay: replay({ points }) }, [6.5], 8000);
    expect(figure.series[0]).toMatchObject({ points: [[-77.5, 2971]], area: [[-77.5, 2971, 5120]] });
    expect(figure.limits).toMatchObject([{ at: 8000, label: 'stage switch 8\u202f000' }]);
  });

  it('leaves out a stage switch far above every lock time', () => {
    expect(timeFigure(input, group, 80_000).limits).toEqual([]);
  });
});

describe('jitterFigure', () => {
  it('has no point where nothing locked and no budget where there is none', () => {
    const points = [result(0, 'fail', { phaseJitterDeg: null }), result(1, 'pass')];
    const figure = jitterFigure({ ...input, replay: replay({ points }) }, group, undefined);
    expect(figure.markers).toHaveLength(1);
    expect(figure.series).toEqual([]);
  });

  it('draws the budget from end to end', () => {
    expect(jitterFigure(input, group, 1.07).series[0]!.points).toEqual([
      [-77.5, 1.07],
      [77.5, 1.07],
    ]);
  });
});

describe('offsetTicks', () => {
  it('puts the required ends in the place of round numbers that would touch them', () => {
    expect(offsetTicks(-155, 155, 77.5, 6)).toEqual([-150, -77.5, 0, 77.5, 150]);
  });
});

describe('levelGroups', () => {
  it('carries at most three Es/N0 in one figure', () => {
    expect(levelGroups(replay({ check: { ...check, esN0Db: [4, 6, 8, 10] } }))).toEqual([[4, 6, 8], [10]]);
  });
});
