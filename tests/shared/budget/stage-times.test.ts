import { describe, expect, it } from 'vitest';
import { acquisitionTime } from '../../../shared/budget/stage-times';
import type { StageDesign } from '../../../shared/model/design';

type Until = { symbols?: number; lockMetric?: number } | undefined;
const timeOf = (untils: Until[], settling: (number | null)[], pullInSymbols: number | null, updateInterval = 1) =>
  acquisitionTime({
    loop: {
      updateInterval,
      stages: untils.map((until, i) => ({ name: `stage${i}`, ...(until ? { until } : {}) })),
      lockDetector: { averagingSymbols: 256, threshold: 0.5 },
    },
    stages: settling.map((settlingUpdates, i) => ({ name: `stage${i}`, settlingUpdates }) as StageDesign),
    pullInSymbols,
  });

describe('acquisitionTime', () => {
  // By hand: 1000 counted out, then 300 to settle; the first needs 500 + 100.
  it('runs a stage for its count, and settles in the last', () => {
    const time = timeOf([{ symbols: 1000 }, undefined], [100, 300], 500);
    expect(time).toEqual({
      settlingSymbols: 100,
      totalSymbols: 1300,
      stages: [
        { stage: 'stage0', untilSymbols: 1000, neededSymbols: 600 },
        { stage: 'stage1', untilSymbols: null, neededSymbols: 300 },
      ],
    });
  });

  // By hand: settled after 600, inside the third block of 256; the fourth ends at 1024.
  it('leaves a stage by the first whole block in lock, or by its count', () => {
    expect(timeOf([{ lockMetric: 0.5 }, undefined], [100, 300], 500).totalSymbols).toBe(1324);
    expect(timeOf([{ lockMetric: 0.5, symbols: 800 }, undefined], [100, 300], 500).totalSymbols).toBe(1100);
  });

  it('counts symbols, not updates', () => {
    expect(timeOf([undefined], [100], 0, 4)).toMatchObject({ settlingSymbols: 400, totalSymbols: 400 });
    expect(timeOf([undefined], [100], 0, 0.5)).toMatchObject({ settlingSymbols: 50 });
  });

  it('has no total where a stage ends too soon, never ends, or does not pull in', () => {
    expect(timeOf([{ symbols: 599 }, undefined], [100, 300], 500).totalSymbols).toBeNull();
    expect(timeOf([undefined, undefined], [100, 300], 500).totalSymbols).toBeNull();
    expect(timeOf([{ symbols: 1000 }, undefined], [100, 300], null).totalSymbols).toBeNull();
    expect(timeOf([undefined], [null], 500)).toMatchObject({ settlingSymbols: null, totalSymbols: null });
  });
});
