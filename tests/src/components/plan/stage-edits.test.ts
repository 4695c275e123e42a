import { describe, expect, it } from 'vitest';
import {
  stagesOf,
  toldOtherwise,
  withOrder,
  withStageAdded,
  withStageRemoved,
} from '../../../../src/components/plan/stage-edits';
import { plan } from '../../support/plan';

const names = (of: ReturnType<typeof plan>): string[] => stagesOf(of, 'carrier').map(({ name }) => name);

describe('stages', () => {
  it('are added ahead of the one in use, and end after a number of symbols', () => {
    const added = withStageAdded(plan(), 'carrier');
    expect(names(added)).toEqual(['acquire', 'narrow', 'track']);
    expect(stagesOf(added, 'carrier')[1]).toMatchObject({ noiseBandwidth: 0.01, until: { symbols: 8000 } });
  });

  it('are taken out, and the new last one stays', () => {
    const left = withStageRemoved(plan(), 'carrier', 1);
    expect(stagesOf(left, 'carrier')).toEqual([{ name: 'acquire', damping: Math.SQRT1_2, noiseBandwidth: 0.01 }]);
  });
});

describe('toldOtherwise', () => {
  // ωn = 2 Bn/(ζ + 1/(4ζ)), so fn = Bn/(π (ζ + 1/(4ζ))): 0.01 · 27.5 MHz at ζ = 1/√2 is 82.529 kHz.
  it('gives the natural frequency of a bandwidth', () => {
    const told = toldOtherwise({ name: 'acquire', damping: Math.SQRT1_2, noiseBandwidth: 0.01 }, 27.5e6);
    expect(told.naturalFrequencyHz).toBeCloseTo(82529, -1);
    expect(told).not.toHaveProperty('noiseBandwidth');
  });

  // ζ = 1/2 tells 1/(4ζ) from ζ/4: fn = Bn/(π · 1).
  it.each([0.5, Math.SQRT1_2, 1, 2])('and back, at ζ = %f', (damping) => {
    const stage = { name: 'track', damping, noiseBandwidth: 0.004 };
    const there = toldOtherwise(stage, 1e6);
    expect(toldOtherwise(there, 1e6).noiseBandwidth).toBeCloseTo(0.004, 7);
    if (damping === 0.5) expect(there.naturalFrequencyHz).toBeCloseTo(4000 / Math.PI, 2);
  });
});

describe('withOrder', () => {
  it('drops the damping factor where the order takes none, and gives it back', () => {
    const third = withOrder(plan(), 'carrier', 3);
    expect(stagesOf(third, 'carrier').every((stage) => !('damping' in stage))).toBe(true);
    expect(stagesOf(withOrder(third, 'carrier', 2), 'carrier')[0]?.damping).toBe(Math.SQRT1_2);
  });
});
