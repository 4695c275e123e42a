import { describe, expect, it } from 'vitest';
import { completePlan } from '../../../shared/plan/complete';
import { requireConsistent } from '../../../shared/plan/consistency';
import { samplePlan } from '../sample-plan';

describe('completePlan', () => {
  it('gives a stage of order 2 the damping factor 1/√2', () => {
    const { carrier } = completePlan(samplePlan({ carrier: { stages: [{ name: 'a', noiseBandwidth: 0.01 }] } }));
    expect(carrier!.stages[0]!.damping).toBe(Math.SQRT1_2);
  });

  it('keeps a damping factor that is there, and gives orders 1 and 3 none', () => {
    const stages = [{ name: 'a', noiseBandwidth: 0.01, damping: 2 }];
    expect(completePlan(samplePlan({ carrier: { stages } })).carrier!.stages[0]!.damping).toBe(2);
    expect(completePlan(samplePlan({ carrier: { order: 3 } })).carrier!.stages[0]!.damping).toBeUndefined();
  });

  it('writes the overflow of every node', () => {
    const nodes = completePlan(samplePlan({ carrier: { arithmetic: { overflow: { error: 'wrap' } } } }));
    expect(nodes.carrier!.arithmetic.overflow).toMatchObject({
      error: 'wrap',
      integrator: 'saturate',
      increment2: 'saturate',
    });
    const one = completePlan(samplePlan({ clock: { arithmetic: { overflow: 'wrap' } } }));
    expect(new Set(Object.values(one.clock!.arithmetic.overflow))).toEqual(new Set(['wrap']));
  });

  it('leaves the plan that it was given as it was', () => {
    const plan = samplePlan();
    const before = structuredClone(plan);
    completePlan(plan);
    expect(plan).toEqual(before);
  });
});

describe('requireConsistent', () => {
  const stage = (name: string) => ({ name, noiseBandwidth: 0.01 });

  it.each([
    [{ carrier: { stages: [stage('a'), stage('b'), stage('a')] } }, '/carrier/stages/2/name'],
    [
      {
        environment: {
          phaseNoise: [
            [100, -20],
            [100, -30],
          ],
        },
      },
      '/environment/phaseNoise/1/0',
    ],
  ])('refuses %o at %s', (parts, parameter) => {
    const check = (): void => requireConsistent(completePlan(samplePlan(parts)));
    expect(check).toThrow(expect.objectContaining({ parameter }));
  });
});
