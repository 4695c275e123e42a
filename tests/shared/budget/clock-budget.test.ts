import { describe, expect, it } from 'vitest';
import { workOut } from '../../../shared/design';
import type { Budget } from '../../../shared/model/design';
import { meanOf, received, timingErrors } from '../detectors/timing-simulation';
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

/** Variance of the timing of a linear loop of order 2, run symbol by symbol on a detector's errors at lock. */
function tracked(errors: Float64Array, kd: number, { g1, g2 }: { g1: number; g2: number }): number {
  const mean = meanOf(errors);
  let [timing, rate, square] = [0, 0, 0];
  errors.forEach((error) => {
    square += timing ** 2;
    const input = (error - mean) / kd - timing;
    rate += g2 * input;
    timing += g1 * input + rate;
  });
  return square / errors.length;
}

describe('clockBudget', () => {
  // A seeded simulation of pulses, noise and detector in another file's own arithmetic, filtered by the loop of this one:
  // 50 000 symbols, 15 % (three deviations). A flat spectrum of the same variance would give three to seven times as much.
  it.each([
    ['gardner', 10],
    ['gardner', 20],
    ['zero-crossing', 20],
  ])('is what a loop makes of simulated errors: %s at %f dB', (detector, esN0Db) => {
    const plan = samplePlan({
      signal: { esN0Db, rollOff: 0.35 },
      carrier: undefined,
      clock: { detector, delay: 0, stages: [{ name: 'track', noiseBandwidth: 0.02 }] },
    });
    const { budget, stages, detector: model } = workOut(plan).clock!;
    const esN0 = 10 ** (esN0Db / 10);
    const errors = timingErrors(
      received({ modulation: 'QPSK', rollOff: 0.35, esN0, symbols: 50_000, seed: 9 }),
      detector,
      0,
    );
    const { thermal, selfNoise } = budget!.stages[0]!;
    const simulated = tracked(errors, model.gain, stages[0]!.gains);
    expect(Math.abs(simulated / (thermal! ** 2 + selfNoise! ** 2) - 1)).toBeLessThan(0.15);
  });

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
