import { describe, expect, it } from 'vitest';
import { carrierBudget } from '../../../shared/budget/carrier-budget';
import { jitterVariance, thermalVariance } from '../../../shared/budget/jitter';
import { carrierDetector } from '../../../shared/detectors/carrier';
import { clockDetector } from '../../../shared/detectors/clock';
import { nominalGains, secondOrderGains } from '../../../shared/loop/gains';
import { linearLoop } from '../../../shared/loop/linear-loop';
import { noiseBandwidth } from '../../../shared/loop/noise-bandwidth';
import { broadcastMask } from '../sample-plan';

const nominal = (bandwidth: number, delay = 0, averaged = 1) =>
  linearLoop({
    gains: secondOrderGains({ damping: Math.SQRT1_2, theta: bandwidth / (1.5 * Math.SQRT1_2) }),
    delay,
    averaged,
  });
const model = carrierDetector('sign', { modulation: 'QPSK', rollOff: 0.35, amplitude: 1, esN0: 10 });
const budgetOf = (
  bandwidth: number,
  delay: number,
  phaseNoise: typeof broadcastMask | undefined,
  method: 'nominal' | 'exact' = 'nominal',
) =>
  carrierBudget({
    model,
    limit: 3,
    stages: [{ name: 'track', loop: nominal(bandwidth, delay) }],
    damping: Math.SQRT1_2,
    method,
    prewarp: false,
    updateInterval: 1,
    updateRateHz: 27.5e6,
    phaseNoise,
  });

describe('thermalVariance', () => {
  // A. D'Andrea, U. Mengali, R. Reggiannini 1994: BnT/γ; derived: 1.0354 times that for sign on QPSK at 10 dB.
  it('is the bound times the excess of the detector', () => {
    const loop = nominal(0.01);
    const bound = (noiseBandwidth(loop) as number) / 10;
    expect((thermalVariance(loop, model, 1) as number) / bound).toBeCloseTo(1.0354, 3);
  });

  // BPSK Costas loop: (BnT/γ)·(1 + 1/(2γ)).
  it('has the squaring loss of the Costas loop', () => {
    const loop = nominal(0.01);
    const costas = carrierDetector('costas', { modulation: 'BPSK', rollOff: 0.35, amplitude: 2, esN0: 10 });
    expect(thermalVariance(loop, costas, 1)).toBeCloseTo(((noiseBandwidth(loop) as number) / 10) * 1.05, 12);
  });

  it('depends on the bandwidth per symbol, not per update', () => {
    expect(thermalVariance(nominal(0.04, 0, 4), model, 4)).toBeCloseTo(
      ((noiseBandwidth(nominal(0.04, 0, 4)) as number) * 0.1035) / 4,
      5,
    );
  });

  it('is not known for coloured errors, nor for an unstable loop', () => {
    const signal = { modulation: 'QPSK', amplitude: 1, esN0: 10, rollOff: 0.35, samplesPerSymbol: 2 } as const;
    const gardner = clockDetector('gardner', signal);
    expect(jitterVariance(nominal(0.01), gardner, 1, null)).toEqual({ thermal: null, oscillator: null, total: null });
    expect(thermalVariance(nominal(0.05, 20), model, 1)).toBeNull();
  });
});

describe('carrierBudget', () => {
  // Independent, scipy quad over the mask and the error of the loop, 27.5 MBd, 10 dB, D = 3, BnT = 0.004.
  it('adds noise and oscillator in squares', () => {
    const [track] = budgetOf(0.004, 3, broadcastMask).stages;
    expect(track!.thermal).toBeCloseTo(1.19031, 4);
    expect(track!.oscillator).toBeCloseTo(1.55883, 3);
    expect(track!.total).toBeCloseTo(1.96133, 3);
    expect(track!.dominant).toBe('oscillator');
  });

  // Published link: the least total of this mask at 10 dB lies near BnT 0.004 at 1.93° (±1 %).
  it('finds the bandwidth with the least total', () => {
    const { best } = budgetOf(0.01, 0, broadcastMask);
    expect(Math.abs(best!.total / 1.93 - 1)).toBeLessThan(0.01);
    expect(best!.noiseBandwidth).toBeGreaterThan(0.003);
    expect(best!.noiseBandwidth).toBeLessThan(0.0045);
    const neighbours = [0.9, 1.1].map(
      (factor) => budgetOf(factor * best!.noiseBandwidth, 0, broadcastMask).stages[0]!.total!,
    );
    expect(Math.min(...neighbours)).toBeGreaterThan(best!.total);
  });

  it('sweeps the bandwidth that is asked for, or the one there is', () => {
    const sweep = budgetOf(0.004, 3, broadcastMask).sweep;
    expect(sweep.noiseBandwidth.length).toBe(sweep.total.length);
    expect(Math.min(...sweep.noiseBandwidth)).toBeLessThan(0.001);
    const exact = budgetOf(0.004, 3, broadcastMask, 'exact');
    expect(exact.best!.total).toBeCloseTo(budgetOf(0.004, 3, broadcastMask).best!.total, 3);
  });

  it('has no best bandwidth without an oscillator, and no oscillator without a table', () => {
    const budget = budgetOf(0.004, 3, undefined);
    expect(budget.best).toBeNull();
    expect(budget.stages[0]).toMatchObject({ oscillator: null, dominant: 'thermal' });
    expect(budget.stages[0]!.total).toBe(budget.stages[0]!.thermal);
  });

  it('has no total for order 1 under a mask', () => {
    const loop = linearLoop({ gains: nominalGains(1, { damping: 1, theta: 0.01 }), delay: 0, averaged: 1 });
    const budget = carrierBudget({
      model,
      limit: 3,
      stages: [{ name: 'only', loop }],
      damping: 1,
      method: 'nominal',
      prewarp: false,
      updateInterval: 1,
      updateRateHz: 1e6,
      phaseNoise: broadcastMask,
    });
    expect(budget.stages[0]).toMatchObject({ oscillator: null, total: null });
    expect(budget.best).toBeNull();
  });
});
