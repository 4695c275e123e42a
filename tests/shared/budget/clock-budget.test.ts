import { describe, expect, it } from 'vitest';
import { workOut } from '../../../shared/design';
import type { Budget } from '../../../shared/model/design';
import { samplePlan } from '../sample-plan';
import type { PlanParts } from '../sample-plan';

const budgetOf = (clock: PlanParts, signal: PlanParts = {}): Budget =>
  workOut(
    samplePlan({
      signal,
      carrier: undefined,
      clock: { delay: 0, stages: [{ name: 'track', noiseBandwidth: 0.002 }], ...clock },
    }),
  ).clock!.budget!;

describe('clockBudget', () => {
  // Derived: Mueller–Müller errors are uncorrelated; with decisions its variance is 2.2 of the timing bound (±3 %) with
  // the slope that it has without noise, and 1/0.978² of that with the real one at 10 dB.
  it('leaves Mueller–Müller 2.2 of the bound', () => {
    const { boundRatio, stages } = budgetOf({ detector: 'mueller-muller' }, { samplesPerSymbol: 1 });
    expect(Math.abs(boundRatio! / (2.2 / 0.978 ** 2) - 1)).toBeLessThan(0.04);
    expect(stages[0]!.selfNoise).toBe(0);
  });

  // Gardner's errors are coloured: S(0)/var ≈ 0.16 at 10 dB, so a flat spectrum would be six times too much. A narrow loop
  // meets S(0); a wider one meets more of the rest.
  it('weighs a coloured error with its spectrum', () => {
    const ratio = (noiseBandwidth: number) => budgetOf({ stages: [{ name: 'track', noiseBandwidth }] }).boundRatio!;
    expect(ratio(1e-4)).toBeGreaterThan(2);
    expect(ratio(1e-4)).toBeLessThan(2.6);
    expect(ratio(0.02)).toBeGreaterThan(1.1 * ratio(1e-4));
  });

  it('has self noise that falls faster than noise when the loop narrows', () => {
    const selfNoise = (noiseBandwidth: number) =>
      budgetOf({ stages: [{ name: 'track', noiseBandwidth }] }, { esN0Db: 30 }).stages[0]!.selfNoise!;
    expect(selfNoise(0.01) / selfNoise(0.001)).toBeGreaterThan(7);
  });

  // By hand: 2^−F of one of N samples, even: 1/(2^6·2·√12) symbols.
  it('has the fraction bits of the interval', () => {
    const [track] = budgetOf({ counter: { fractionBits: 6 } }).stages;
    expect(track!.phaseQuantisation).toBeCloseTo(1 / (64 * 2 * Math.sqrt(12)), 9);
    expect(
      budgetOf({ counter: { fractionBits: 6 } }, { samplesPerSymbol: 4 }).stages[0]!.phaseQuantisation,
    ).toBeCloseTo(1 / (64 * 4 * Math.sqrt(12)), 9);
  });

  it('knows no oscillator, no drift and no best bandwidth', () => {
    const budget = budgetOf({});
    expect(budget.stages[0]).toMatchObject({ oscillator: null, drift: null, dominant: 'thermal' });
    expect(budget).toMatchObject({ unit: 'symbols', drift: null, nco: null, implementationLoss: null, best: null });
  });

  // Few counter bits round the rate so coarsely that a narrow loop walks: the total rises to either side.
  it('has a best bandwidth where its words make a narrow loop walk', () => {
    const { best, sweep } = budgetOf(
      { counter: { widthBits: 14, fractionBits: 10 }, arithmetic: { guardBits: 2 } },
      { esN0Db: 25 },
    );
    expect(best).not.toBeNull();
    expect(best!.total).toBeLessThanOrEqual(Math.min(...sweep.total.map((total) => total!)) * 1.0001);
  });

  // ρ = 1/((2π)²σ²) for a slip of one symbol.
  it('slips a symbol after the time of its jitter', () => {
    const { slip, stages } = budgetOf({ stages: [{ name: 'track', noiseBandwidth: 0.02 }] }, { esN0Db: 3 });
    expect(slip!.rho).toBeCloseTo(1 / (2 * Math.PI * stages[0]!.total!) ** 2, 9);
  });
});
