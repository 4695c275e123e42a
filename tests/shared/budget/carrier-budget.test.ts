import { describe, expect, it } from 'vitest';
import { workOut } from '../../../shared/design';
import type { Budget } from '../../../shared/model/design';
import { samplePlan } from '../sample-plan';
import type { PlanParts } from '../sample-plan';

/** QPSK at 27.5 MBd and 10 dB under the broadcast mask, one stage. */
function budgetOf(carrier: PlanParts, parts: PlanParts = {}): Budget {
  const plan = samplePlan({
    ...parts,
    clock: undefined,
    carrier: { stages: [{ name: 'track', noiseBandwidth: 0.004 }], ...carrier },
  });
  return workOut(plan).carrier!.budget!;
}
const only = (bandwidth: number): PlanParts => ({ stages: [{ name: 'track', noiseBandwidth: bandwidth }] });
const quiet = { environment: { phaseNoise: undefined } };
const squares = (...values: (number | null)[]): number => Math.hypot(...values.map((value) => value ?? 0));

describe('carrierBudget', () => {
  // Independent, scipy quad over the mask and the error of the loop, 27.5 MBd, 10 dB, D = 3, BnT = 0.004.
  it('adds every term in squares', () => {
    const [track] = budgetOf({}).stages;
    expect(track!.thermal).toBeCloseTo(1.19031, 4);
    expect(track!.oscillator).toBeCloseTo(1.55883, 4);
    expect(track!.selfNoise).toBe(0);
    const { thermal, oscillator, phaseQuantisation, wordQuantisation, drift } = track!;
    expect(track!.total).toBeCloseTo(squares(thermal, oscillator, phaseQuantisation, wordQuantisation, drift), 12);
    expect(track!.dominant).toBe('oscillator');
  });

  // Published link: the least total of this mask at 10 dB lies near BnT 0.004 at 1.93° (±1 %).
  it('finds the bandwidth with the least total', () => {
    const { best } = budgetOf({ ...only(0.01), delay: 0 });
    expect(Math.abs(best!.total / 1.93 - 1)).toBeLessThan(0.01);
    expect(best!.noiseBandwidth).toBeGreaterThan(0.003);
    expect(best!.noiseBandwidth).toBeLessThan(0.0045);
    const neighbours = [0.97, 1.03].map(
      (factor) => budgetOf({ ...only(factor * best!.noiseBandwidth), delay: 0 }).stages[0]!.total!,
    );
    expect(Math.min(...neighbours)).toBeGreaterThan(best!.total);
  });

  it('finds the same best from any bandwidth, and by either method', () => {
    const totals = [0.0001, 0.02].map((bandwidth) => budgetOf(only(bandwidth)).best!.total);
    const exact = budgetOf({ method: 'exact' }).best!.total;
    for (const total of totals) expect(Math.abs(total / budgetOf({}).best!.total - 1)).toBeLessThan(1e-4);
    expect(exact).toBeCloseTo(totals[0]!, 3);
  });

  it('sweeps every term, and agrees with the stage where it passes its bandwidth', () => {
    const { sweep, stages } = budgetOf({});
    const lengths = Object.values(sweep).map((column) => (column as unknown[]).length);
    expect(new Set(lengths)).toEqual(new Set([25]));
    const above = sweep.noiseBandwidth.findIndex((bandwidth) => bandwidth > 0.004);
    const [low, high] = [sweep.thermal[above - 1]!, sweep.thermal[above]!];
    expect(stages[0]!.thermal).toBeGreaterThan(low);
    expect(stages[0]!.thermal).toBeLessThan(high);
  });

  // Derived: a drift of ḟ leaves 2πḟTu²/g2 on a loop of order 2. By hand, BnT 0.01, D = 0: g2 = 4/11401.
  it('stands off under a drift', () => {
    const environment = { phaseNoise: undefined, dopplerRateHzPerS: 1e9 };
    const budget = budgetOf({ ...only(0.01), delay: 0 }, { environment });
    const radians = (2 * Math.PI * 1e9 * 11401) / (4 * 27.5e6 ** 2);
    expect(budget.drift).toEqual({ rateHzPerS: 1e9, staticError: expect.closeTo((180 / Math.PI) * radians, 9) });
    expect(budget.stages[0]!.drift).toBeCloseTo((180 / Math.PI) * radians, 9);
    // The same link updated every fourth symbol at the same BnT has the same natural frequency, to some per cent.
    const slower = budgetOf({ ...only(0.01), delay: 0, updateInterval: 4 }, { environment }).drift!.staticError!;
    expect(Math.abs(slower / budget.drift!.staticError! - 1)).toBeLessThan(0.15);
    expect(budget.best!.noiseBandwidth).toBeGreaterThan(0.001);
  });

  it('stands still under a drift with order 3, and grows without bound with order 1', () => {
    const environment = { phaseNoise: undefined, dopplerRateHzPerS: 1e6 };
    expect(budgetOf({ order: 3 }, { environment }).drift!.staticError).toBe(0);
    const first = budgetOf({ order: 1 }, { environment });
    expect(first.drift!.staticError).toBeNull();
    expect(first.stages[0]).toMatchObject({ drift: null, total: null, dominant: null });
    expect(budgetOf({ order: 1 }, quiet).stages[0]!.total).toBeGreaterThan(0);
  });

  it('has no oscillator without a table, and no total for order 1 with one', () => {
    const budget = budgetOf({}, quiet);
    expect(budget.stages[0]).toMatchObject({ oscillator: null, dominant: 'thermal' });
    expect(budget.best).toBeNull();
    expect(budgetOf({ order: 1 }).stages[0]).toMatchObject({ oscillator: null, total: null });
    expect(budgetOf({ order: 1 }).best).toBeNull();
  });

  // Derived: sign on QPSK leaves 1.000 / 1.0023 / 1.0354 / 4.36 of the bound at 15 / 12 / 10 / 3 dB; Costas on BPSK
  // 1 + 1/(2γ): 1.500 / 1.251 / 1.126 / 1.050 at 0 / 3 / 6 / 10 dB.
  it.each([
    ['sign', 'QPSK', 15, 1.0],
    ['sign', 'QPSK', 12, 1.0023],
    ['sign', 'QPSK', 10, 1.0354],
    ['sign', 'QPSK', 3, 4.36],
    ['costas', 'BPSK', 0, 1.5],
    ['costas', 'BPSK', 3, 1.251],
    ['costas', 'BPSK', 6, 1.126],
    ['costas', 'BPSK', 10, 1.05],
  ])('%s on %s at %f dB loses %f against known symbols', (detector, modulation, esN0Db, loss) => {
    const budget = budgetOf({ detector }, { ...quiet, signal: { modulation, esN0Db } });
    expect(Math.abs(budget.squaringLoss! / loss - 1)).toBeLessThan(5e-4 * (loss > 4 ? 3 : 1));
    expect(budget.boundRatio).toBe(budget.squaringLoss);
  });

  // Published: phase truncation 2π/2^P/√12; 0.0254° at 12 bits by hand. Resolution fn/2^W: 100 MHz/2³² = 0.0232830644 Hz.
  it('says what the NCO leaves', () => {
    const { nco } = budgetOf({ nco: { widthBits: 32, phaseBits: 12 } }, { signal: { symbolRateBd: 1e8 } });
    expect(nco!.truncationDeg).toBeCloseTo(360 / 4096 / Math.sqrt(12), 7);
    expect(nco!.resolutionHz).toBeCloseTo(0.0232830644, 9);
    expect(nco!.worstSpurDbc).toBeCloseTo(-72.25, 2);
  });

  // ρ = 1/(M²σ²): by hand from the jitter of the stage.
  it('slips after the time of its random jitter', () => {
    const { slip, stages } = budgetOf(only(0.02), { signal: { esN0Db: 4 } });
    expect(slip!.rho).toBeCloseTo(1 / (4 * stages[0]!.total! * (Math.PI / 180)) ** 2, 9);
    expect(slip!.symbols! / slip!.seconds!).toBeCloseTo(27.5e6, 0);
  });

  it('knows nothing of an unstable stage but its name', () => {
    const budget = budgetOf({ ...only(0.05), delay: 20 });
    expect(budget.stages[0]).toMatchObject({ stage: 'track', thermal: null, total: null });
    expect(budget).toMatchObject({ squaringLoss: null, slip: null, boundRatio: null });
    expect(budget.best!.total).toBeGreaterThan(0);
  });
});
