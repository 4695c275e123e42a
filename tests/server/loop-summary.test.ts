import { describe, expect, it } from 'vitest';
import { loopSummary } from '../../server/services/loop-summary';
import { workOut } from '../../shared/design';
import type { Design } from '../../shared/model/design';
import { samplePlan, type PlanParts } from '../shared/sample-plan';

const designOf = (parts: PlanParts): Design => ({ ...workOut(samplePlan(parts)), digest: '' });

describe('loopSummary', () => {
  // By hand: a first-order loop without delay closes the share g of what is left at every update, so after k updates
  // 1 − (1 − g)^k is closed, and its bandwidth of 0.01 cycles per update takes g = 2θ/(1 + θ) with θ = 2 · 0.01.
  it('draws the phase step of a first-order loop', () => {
    const stages = [{ name: 'track', noiseBandwidth: 0.01 }];
    const summary = loopSummary(designOf({ carrier: { order: 1, delay: 0, method: 'nominal', stages } }))!;
    const g = 0.04 / 1.02;
    expect(summary.step).toHaveLength(48);
    expect(summary.step[0]).toBeCloseTo(1 - (1 - g) ** 4, 3);
    const at = 4 * 300 ** (20 / 47);
    expect(summary.step[20]).toBeCloseTo(1 - (1 - g) ** at, 3);
    expect(summary.step[47]).toBeCloseTo(1, 3);
  });

  it('speaks of the last stage', () => {
    const stages = [0.02, 0.005].map((noiseBandwidth, i) => ({
      name: `s${i}`,
      noiseBandwidth,
      ...(i === 0 && { until: { symbols: 100 } }),
    }));
    const design = designOf({ carrier: { stages } });
    expect(loopSummary(design)!.noiseBandwidth).toBe(design.carrier!.stages[1]!.noiseBandwidth.exact);
  });

  it('speaks of the clock loop where there is no other', () => {
    const { carrier: _, ...clockOnly } = designOf({});
    expect(loopSummary(clockOnly)!.loop).toBe('clock');
    const { clock: _clock, ...neither } = clockOnly;
    expect(loopSummary(neither)).toBeNull();
  });
});
