import { describe, expect, it, vi } from 'vitest';
import { powerOf, runTrial } from '../../../shared/replay/receiver';
import { runPoint } from '../../../shared/replay/run-point';
import type { ReplayJob } from '../../../shared/replay/job';
import { carrierOf, jobOf, type Link } from './link';

vi.setConfig({ testTimeout: 60_000 });

const links: Link[] = [
  { modulation: 'QPSK', detector: 'sign', esN0Db: 10, noiseBandwidth: 0.01 },
  { modulation: 'QPSK', detector: 'sign', esN0Db: 20, noiseBandwidth: 0.005, damping: 0.5 },
  { modulation: 'QPSK', detector: 'sign', esN0Db: 12, noiseBandwidth: 0.01, delay: 3 },
  { modulation: 'BPSK', detector: 'costas', esN0Db: 15, noiseBandwidth: 0.02, damping: 1.5 },
  { modulation: 'BPSK', detector: 'costas', esN0Db: 15, noiseBandwidth: 0.01, damping: 0.5, updateInterval: 4 },
  { modulation: 'BPSK', detector: 'sign', esN0Db: 20, noiseBandwidth: 0.01, delay: 3 },
];

/** Trials of a job whose phase error ever left its first null by a whole period. */
function slipped(job: ReplayJob): number {
  let slips = 0;
  for (let trial = 0; trial < job.check.trials; trial++) {
    let [first, farthest] = [NaN, 0];
    runTrial(job, 0, trial, ({ errors, count }) => {
      for (let k = 0; k < count; k++) {
        if (Number.isNaN(first)) first = errors[k]!;
        farthest = Math.max(farthest, Math.abs(errors[k]! - first));
      }
    });
    if (farthest >= 1) slips += 1;
  }
  return slips;
}

/** Mean lock time of the trials that lock, symbols, and their number. */
function lockTimes(job: ReplayJob): { mean: number; locks: number } {
  const results = Array.from({ length: job.check.trials }, (_, trial) => runTrial(job, 0, trial, () => {}).result());
  const times = results.filter(({ outcome }) => outcome === 'locked').map(({ lockTimeSymbols }) => lockTimeSymbols);
  return { mean: times.reduce((sum, time) => sum + time, 0) / times.length, locks: times.length };
}

/** Mean phase error at the end of each trial, degrees. */
function restingPlaces(job: ReplayJob): number[] {
  return Array.from({ length: job.check.trials }, (_, trial) => {
    let mean = 0;
    runTrial(job, 0, trial, ({ errors, count }) => {
      const near = [...errors.subarray(0, count)].map((error) => error - Math.round(error));
      mean = near.reduce((sum, error) => sum + error, 0) / count;
    });
    return (mean * 360) / powerOf(job);
  });
}

// An estimate: the range within which no trial slips lies between the sheet's value and three times it.
describe('the lock-in range of a replay against the estimate', () => {
  it.each(links)('%j', (link) => {
    const carrier = carrierOf(link);
    const lockInHz = carrier.acquisition.lockInHz!;
    const run = { symbols: 2000, trials: 30 };
    expect(slipped(jobOf(link, carrier, { ...run, offsetHz: 0.9 * lockInHz }))).toBe(0);
    expect(slipped(jobOf(link, carrier, { ...run, offsetHz: 3 * lockInHz }))).toBe(30);
  });
});

// Above six lock-in ranges the mean over trials agrees with the estimate within 25 %.
describe('the pull-in time of a replay against the estimate', () => {
  it.each(links)('%j', (link) => {
    const { lockInHz, pullInRangeHz } = carrierOf(link).acquisition;
    const offsetHz = Math.min(7 * lockInHz!, 0.8 * pullInRangeHz!);
    const carrier = carrierOf({ ...link, environment: { dopplerHz: offsetHz } });
    const { offsetHz: asked, pullInSymbols } = carrier.acquisition;
    expect(asked).toBe(offsetHz);
    const { mean, locks } = lockTimes(
      jobOf(link, carrier, { offsetHz, symbols: Math.ceil(3 * pullInSymbols!), trials: 12 }),
    );
    expect(locks).toBe(12);
    expect(mean / pullInSymbols!).toBeGreaterThan(0.75);
    expect(mean / pullInSymbols!).toBeLessThan(1.25);
  });

  it.each(links.filter(({ delay }) => delay))('never locks beyond the pull-in range: %j', (link) => {
    const { pullInRangeHz } = carrierOf(link).acquisition;
    const offsetHz = 1.2 * pullInRangeHz!;
    const carrier = carrierOf({ ...link, environment: { dopplerHz: offsetHz } });
    expect(carrier.acquisition.pullInSymbols).toBeNull();
    expect(lockTimes(jobOf(link, carrier, { offsetHz, symbols: 30_000, trials: 6 })).locks).toBe(0);
  });
});

// Published: 16QAM has false stable nulls near ±31°, 16APSK near ±29° (design values at high Es/N0).
describe('the false nulls of a detector in a replay', () => {
  it.each([
    { modulation: '16QAM', detector: 'decision', esN0Db: 20, noiseBandwidth: 0.01 },
    { modulation: '16APSK', detector: 'decision', esN0Db: 20, noiseBandwidth: 0.01 },
  ])('hold some trials, which are no locks: $modulation', (link) => {
    const carrier = carrierOf(link);
    const stable = carrier.detector.nulls.filter((each) => each.stable && !each.lock);
    expect(stable.length).toBeGreaterThan(0);
    const job = jobOf(link, carrier, { symbols: 6000, trials: 60 });
    const { locks, falseLocks, phaseBiasDeg } = runPoint(job, 0);
    expect(falseLocks).toBeGreaterThan(0);
    expect(locks).toBeGreaterThan(10);
    expect(Math.abs(phaseBiasDeg!)).toBeLessThan(1);
    // Where such trials rest on average is where the sheet has its null.
    const rests = restingPlaces(job)
      .map(Math.abs)
      .filter((degrees) => degrees > 20);
    const mean = rests.reduce((sum, degrees) => sum + degrees, 0) / rests.length;
    expect(Math.abs(mean - (stable.at(-1)!.x * 180) / Math.PI)).toBeLessThan(2);
  });
});
