import { describe, expect, it } from 'vitest';
import { runPoint } from '../../../shared/replay/run-point';
import { traceTrial } from '../../../shared/replay/trace';
import { qpskJob } from './link';

const job = qpskJob({ check: { offsetsHz: [-40000, 40000], symbols: 6000, trials: 3 } });

describe('traceTrial', () => {
  const trace = traceTrial(job, 1, 2);

  it('follows the offset and keeps the phase error inside ±45°', () => {
    expect(trace.outcome).toBe('locked');
    const settled = trace.frequencyHz.slice(-400);
    const mean = settled.reduce((sum, value) => sum + value, 0) / settled.length;
    expect(Math.abs(mean - 40000)).toBeLessThan(4000);
    expect(Math.abs(trace.integratorHz.at(-1)! - 40000)).toBeLessThan(8000);
    expect(Math.max(...trace.phaseErrorDeg.slice(-400).map(Math.abs))).toBeLessThan(15);
    expect(Math.max(...trace.phaseErrorDeg.map(Math.abs))).toBeLessThanOrEqual(45);
  });

  it('has one element of each curve for every decimated symbol', () => {
    expect(trace.decimation).toBe(3);
    expect(trace.symbol).toHaveLength(2000);
    for (const curve of [trace.phaseErrorDeg, trace.frequencyHz, trace.integratorHz, trace.stage]) {
      expect(curve).toHaveLength(2000);
    }
  });

  // QPSK points lie at (±1 ± j)/√2 in units of the amplitude; at 10 dB a rail deviates by 1/√20.
  it('ends with the constellation at its four points', () => {
    expect(trace.constellation.before).toHaveLength(400);
    expect(trace.constellation.after).toHaveLength(400);
    const rail = trace.constellation.after.reduce((sum, [i]) => sum + Math.abs(i), 0) / 400;
    expect(Math.abs(rail - Math.SQRT1_2)).toBeLessThan(5 / Math.sqrt(20 * 400));
  });

  it('is the trial that the point counted', () => {
    const times = [0, 1, 2].map((trial) => traceTrial(job, 1, trial).lockedAtSymbol!).sort((a, b) => a - b);
    expect(runPoint(job, 1).lockTimeSymbols).toEqual({ p50: times[1], p95: times[2] });
  });

  it('names a trial outside the check', () => {
    expect(() => traceTrial(job, 1, 3)).toThrow(expect.objectContaining({ parameter: 'trial' }));
  });
});
