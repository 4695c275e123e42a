import { describe, expect, it } from 'vitest';
import { workOut } from '../../../shared/design';
import type { Acquisition } from '../../../shared/model/design';
import { samplePlan } from '../sample-plan';
import type { PlanParts } from '../sample-plan';

const acquisitionOf = (carrier: PlanParts, parts: PlanParts = {}): Acquisition =>
  workOut(samplePlan({ ...parts, clock: undefined, carrier: { delay: 0, ...carrier } })).carrier!.acquisition;
const stage = (more: PlanParts = {}): PlanParts => ({ stages: [{ name: 'only', noiseBandwidth: 0.01, ...more }] });

describe('carrierAcquisition', () => {
  // F. Gardner 2005 and derived: with ωn = 2·BnT·Rs/(1.5/√2), BPSK Costas (M = 2) locks in over 2ζωn/2 and pulls out at
  // 1.8·ωn·(ζ + 1)/2, within 2 %.
  it('has the ranges of a sinusoid', () => {
    const { lockInHz, pullOutHz } = acquisitionOf(
      { ...stage(), detector: 'costas' },
      { signal: { modulation: 'BPSK' } },
    );
    const natural = (2 * 0.01 * 27.5e6) / (1.5 * Math.SQRT1_2) / (2 * Math.PI);
    expect(Math.abs(lockInHz! / (Math.SQRT1_2 * natural) - 1)).toBeLessThan(2e-3);
    expect(Math.abs(pullOutHz! / (0.9 * natural * (1 + Math.SQRT1_2)) - 1)).toBeLessThan(0.02);
  });

  // Derived: 1.62·ωn for sign on QPSK at ζ = 1/√2 and high Es/N0, less with noise.
  it('has the pull-out of sign on QPSK', () => {
    const natural = (2 * 0.01 * 27.5e6) / (1.5 * Math.SQRT1_2) / (2 * Math.PI);
    const at = (esN0Db: number) => acquisitionOf(stage(), { signal: { esN0Db } }).pullOutHz! / natural;
    expect(Math.abs(at(35) / 1.62 - 1)).toBeLessThan(0.05);
    expect(at(6)).toBeLessThan(at(35));
  });

  // By hand: order 1 follows g1·max s per symbol; g1 = 2θ/(1 + θ), θ = 2·BnT, max s = ½ for sin(2φ)/2.
  it('has one range for order 1', () => {
    const costas = { ...stage(), detector: 'costas', order: 1 };
    const range = (((0.04 / 1.02) * 0.5) / (2 * Math.PI)) * 27.5e6;
    const near = acquisitionOf(costas, {
      signal: { modulation: 'BPSK' },
      environment: { carrierTolerancePpm: 0, dopplerHz: 0.9 * range },
    });
    expect(near.lockInHz! / range).toBeCloseTo(1, 3);
    expect(near).toMatchObject({ pullInSymbols: 0, pullOutHz: near.lockInHz, pullInRangeHz: near.lockInHz });
    const far = acquisitionOf(costas, {
      signal: { modulation: 'BPSK' },
      environment: { carrierTolerancePpm: 0, dopplerHz: 1.1 * range },
    });
    expect(far).toMatchObject({ pullInSymbols: null, totalSymbols: null });
  });

  it('adds pull-in and settling up', () => {
    const { pullInSymbols, settlingSymbols, totalSymbols, stages } = acquisitionOf(stage());
    expect(totalSymbols).toBeCloseTo(pullInSymbols! + settlingSymbols!, 9);
    expect(stages).toEqual([{ stage: 'only', untilSymbols: null, neededSymbols: totalSymbols }]);
  });

  // By hand: E|z|⁴ = 1 + 4/γ + 2/γ² = 1.42 at 10 dB, and hardly any jitter; unlocked 1/√(2N) and more with noise.
  it('says what the lock detector lets through', () => {
    const { lockDetector } = acquisitionOf(stage({ noiseBandwidth: 1e-4, until: { lockMetric: 0.3 } }), {
      environment: { phaseNoise: undefined },
    });
    expect(lockDetector!.meanLocked).toBeCloseTo(1 / 1.42, 3);
    expect(lockDetector!.deviationUnlocked).toBeGreaterThan(1 / Math.sqrt(512));
    expect(lockDetector!.thresholds.map(({ stage: name, threshold }) => [name, threshold])).toEqual([
      ['only', 0.3],
      [null, 0.5],
    ]);
    const [low, high] = [lockDetector!.thresholds[0]!, lockDetector!.thresholds[1]!];
    expect(low.falseAlarm).toBeGreaterThan(high.falseAlarm);
    expect(low.miss).toBeLessThan(high.miss);
    // The normal density summed up beyond the threshold, which the words cut to 1/256.
    const cut = Math.floor(256 * 0.3) / 256;
    const wide = acquisitionOf(stage({ until: { lockMetric: 0.3 } }), { signal: { esN0Db: -3 } }).lockDetector!;
    const beyond = cut / wide.deviationUnlocked;
    expect(beyond).toBeLessThan(6);
    const sum = Array.from({ length: 20_000 }, (_, i) => beyond + (i + 0.5) * 1e-3).reduce(
      (total, x) => total + (1e-3 * Math.exp((-x * x) / 2)) / Math.sqrt(2 * Math.PI),
      0,
    );
    expect(wide.thresholds[0]!.falseAlarm / sum).toBeCloseTo(1, 5);
  });
});

describe('clockAcquisition', () => {
  // By hand: Gardner is a sine of period 1, max s = 1/(2π) symbols, so lock-in is 2ζωnT/(2π) symbols per symbol.
  it('locks in over 2ζωnT/2π', () => {
    const { acquisition } = workOut(
      samplePlan({ carrier: undefined, clock: { delay: 0, stages: [{ name: 'only', noiseBandwidth: 0.001 }] } }),
    ).clock!;
    const omega = (2 * 0.001) / (1.5 * Math.SQRT1_2);
    expect(Math.abs(acquisition.lockInPpm! / ((1e6 * Math.SQRT2 * omega) / (2 * Math.PI)) - 1)).toBeLessThan(2e-3);
    expect(acquisition).toMatchObject({ lockInHz: null, pullOutHz: null, lockDetector: null, pullInSymbols: 0 });
  });
});
