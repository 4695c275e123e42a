import { describe, expect, it } from 'vitest';
import { planChanges, withChanges } from '../../../shared/plan/changes';
import { withValue } from '../../../shared/plan/pointer';

const plan = {
  name: 'Transponder 17',
  target: 'corvid-c2',
  signal: { symbolRateBd: 27.5e6 },
  carrier: {
    delay: 3,
    stages: [
      { name: 'acquire', damping: Math.SQRT1_2, noiseBandwidth: 0.01 },
      { name: 'track', damping: Math.SQRT1_2, noiseBandwidth: 0.004 },
    ],
    arithmetic: { integratorLimitHz: 250e3 },
  },
};

const pointersOf = (after: unknown): string[] => planChanges(plan, after).map(({ pointer }) => pointer);

describe('planChanges', () => {
  it('finds nothing between a plan and itself', () => {
    expect(planChanges(plan, structuredClone(plan))).toEqual([]);
  });

  it('names a field with both values', () => {
    const after = withValue(plan, '/carrier/arithmetic/integratorLimitHz', 70e3);
    expect(planChanges(plan, after)).toEqual([
      { pointer: '/carrier/arithmetic/integratorLimitHz', before: 250e3, after: 70e3 },
    ]);
  });

  it('takes an absent key for its default', () => {
    const completed = withValue(withValue(plan, '/signal/rollOff', 0.35), '/carrier/polarity', 1);
    expect(planChanges(plan, completed)).toEqual([]);
    expect(pointersOf(withValue(plan, '/signal/rollOff', 0.2))).toEqual(['/signal/rollOff']);
  });

  it('takes one overflow word and the same word at every node for one thing', () => {
    const nodes = ['sample', 'error', 'proportional', 'increment', 'integrator', 'increment2', 'integrator2'];
    const each = Object.fromEntries(nodes.map((node) => [node, 'saturate']));
    expect(pointersOf(withValue(plan, '/carrier/arithmetic/overflow', each))).toEqual([]);
    expect(pointersOf(withValue(plan, '/carrier/arithmetic/overflow', { ...each, error: 'wrap' }))).toEqual([
      '/carrier/arithmetic/overflow',
    ]);
  });

  it('does not mind the order of keys', () => {
    const { carrier, ...rest } = plan;
    expect(planChanges(plan, { carrier, ...rest })).toEqual([]);
  });

  it('compares stages one by one, and as a whole when their number differs', () => {
    expect(pointersOf(withValue(plan, '/carrier/stages/1/noiseBandwidth', 0.002))).toEqual([
      '/carrier/stages/1/noiseBandwidth',
    ]);
    expect(pointersOf(withValue(plan, '/carrier/stages/0', undefined))).toEqual(['/carrier/stages']);
  });

  it('shows a loop that only one plan has as one change', () => {
    expect(pointersOf(withValue(plan, '/carrier', undefined))).toEqual(['/carrier']);
    expect(pointersOf(withValue(plan, '/clock', { stages: [{ name: 'track', noiseBandwidth: 0.001 }] }))).toEqual([
      '/clock',
    ]);
  });
});

describe('withChanges', () => {
  it('turns one plan into the other and back', () => {
    const after = withValue(withValue(plan, '/name', 'Transponder 18'), '/carrier/stages/0', undefined);
    const changes = planChanges(plan, after);
    expect(withChanges(plan, changes, 'after')).toEqual(after);
    expect(withChanges(after, changes, 'before')).toEqual(plan);
  });
});
