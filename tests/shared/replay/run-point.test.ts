import Ajv2020 from 'ajv/dist/2020';
import { describe, expect, it, vi } from 'vitest';
import schema from '../../../schemas/replay-point.schema.json';
import { digestContent } from '../../../shared/replay/digest';
import { pointCount } from '../../../shared/replay/job';
import { runPoint } from '../../../shared/replay/run-point';
import { gains, qpskJob, symbolRateBd } from './link';

// Millions of draws take their time on a busy machine.
vi.setConfig({ testTimeout: 60_000 });

const validate = new Ajv2020().compile(schema);

/** Exact noise bandwidth of an order-2 loop without delay (closed form of ½ Σ h²). */
function exactBandwidth(wanted: number): number {
  const { g1, g2 } = gains(wanted);
  return (2 * g1 ** 2 + 2 * g2 + g1 * g2) / (2 * g1 * (4 - 2 * g1 - g2));
}

describe('runPoint', () => {
  // Linear theory: variance of the phase is BnT/γ, exact BnT, times the sign detector's loss over the bound:
  // 1.0354 / 1.0023 / 1.000 at 10 / 12 / 15 dB (derived from the detector's slope and variance in closed form).
  it.each([
    [0.004, 10, 1.0354],
    [0.01, 10, 1.0354],
    [0.02, 10, 1.0354],
    [0.01, 12, 1.0023],
    [0.01, 15, 1.0],
  ])('jitters as linear theory says within 10 %% at BnT %f, %i dB', (noiseBandwidth, esN0Db, loss) => {
    const job = qpskJob({ noiseBandwidth, esN0Db, check: { symbols: 20000, trials: 20 } });
    const theoryDeg = (180 / Math.PI) * Math.sqrt((exactBandwidth(noiseBandwidth) * loss) / 10 ** (esN0Db / 10));
    const { phaseJitterDeg, locks } = runPoint(job, 0);
    expect(locks).toBe(20);
    expect(phaseJitterDeg! / theoryDeg).toBeGreaterThan(0.9);
    expect(phaseJitterDeg! / theoryDeg).toBeLessThan(1.1);
  });

  it('locks at zero offset, whatever the phase, and says so in the shape of the schema', () => {
    const point = runPoint(qpskJob(), 0);
    expect(point.locks).toBe(20);
    expect(point).toMatchObject({ falseLocks: 0, cycleSlips: 0, verdict: 'pass' });
    expect(Math.abs(point.residualOffsetHz!)).toBeLessThan(symbolRateBd * 1e-4);
    expect(validate(point), JSON.stringify(validate.errors)).toBe(true);
  });

  it('finds the offset applied in the settled frequency word, centre frequency or not', () => {
    for (const centreHz of [0, -3.1e6]) {
      const { locks, residualOffsetHz } = runPoint(qpskJob({ centreHz, check: { offsetsHz: [60000] } }), 0);
      expect(locks).toBe(20);
      expect(Math.abs(residualOffsetHz!)).toBeLessThan(500);
    }
  });

  it('does not lock beyond what the integrator holds', () => {
    const job = qpskJob({ integratorLimitHz: 50000, check: { offsetsHz: [40000, 500000] } });
    expect(runPoint(job, 0).locks).toBe(20);
    const beyond = runPoint(job, 1);
    expect(beyond).toMatchObject({
      locks: 0,
      falseLocks: 0,
      lockTimeSymbols: null,
      phaseJitterDeg: null,
      verdict: 'fail',
    });
    expect(beyond.cycleSlips).toBeGreaterThan(0);
    expect(validate(beyond)).toBe(true);
  });

  // False locks of QPSK lie at k·Rs/4: one sample a symbol cannot tell them from lock.
  it.each([1, -1])('reports a false lock at %i · Rs/4', (k) => {
    const job = qpskJob({ check: { offsetsHz: [(k * symbolRateBd) / 4] } });
    expect(runPoint(job, 0)).toMatchObject({ locks: 0, falseLocks: 20, verdict: 'fail' });
  });

  it('pulls in later from a larger offset', () => {
    const job = qpskJob({ check: { offsetsHz: [0, 300000], symbols: 20000 } });
    const [near, far] = [runPoint(job, 0), runPoint(job, 1)];
    expect(far.locks).toBe(20);
    expect(far.lockTimeSymbols!.p50).toBeGreaterThan(near.lockTimeSymbols!.p95);
    expect(far.lockTimeSymbols!.p95).toBeGreaterThanOrEqual(far.lockTimeSymbols!.p50);
  });

  it('gives the same digest again, and in any order of the points', () => {
    const job = qpskJob({ check: { offsetsHz: [-50000, 0, 50000], esN0Db: [7, 10], trials: 4, symbols: 1000 } });
    const order = Array.from({ length: pointCount(job) }, (_, index) => index);
    const content = (indices: number[]) =>
      JSON.stringify(
        digestContent(
          job,
          '1.0.0',
          indices.map((i) => runPoint(job, i)),
        ),
      );
    expect(content(order)).toBe(content([...order].reverse()));
    const checksums = order.map((index) => runPoint(job, index).checksum);
    expect(new Set(checksums).size).toBe(6);
  });

  it('holds every figure that it measures in its digest', () => {
    const job = qpskJob({ check: { trials: 2, symbols: 500 } });
    const point = runPoint(job, 0);
    const content = (changed: object) => JSON.stringify(digestContent(job, '1.0.0', [{ ...point, ...changed }]));
    const figures = ['locks', 'falseLocks', 'residualOffsetHz', 'phaseJitterDeg', 'phaseBiasDeg', 'cycleSlips'];
    for (const figure of figures) expect(content({ [figure]: 7 }), figure).not.toBe(content({}));
    expect(content({ lockTimeSymbols: { p50: 1, p95: 2 } })).not.toBe(content({}));
    expect(content({ checksum: '0000000000000000' })).not.toBe(content({}));
  });

  it('depends on the seed', () => {
    const [one, other] = [65, 66].map((seed) => runPoint(qpskJob({ check: { seed, trials: 2, symbols: 500 } }), 0));
    expect(one!.checksum).not.toBe(other!.checksum);
  });

  // The number itself has no source outside: it holds the simulator to what evidence was filed with.
  it('keeps the checksum of a short run', () => {
    expect(runPoint(qpskJob({ check: { trials: 2, symbols: 500 } }), 0).checksum).toMatchInlineSnapshot(
      `"f6982f414adb5601"`,
    );
  });

  it('gives the same nodes in unbounded integers', () => {
    const check = { trials: 1, symbols: 600, offsetsHz: [20000] };
    const [narrow, wide] = [44, 60].map((integratorBits) => runPoint(qpskJob({ integratorBits, check }), 0));
    expect({ ...wide, checksum: '' }).toEqual({ ...narrow, checksum: '' });
    expect(wide!.checksum).toBe(narrow!.checksum);
  });

  it('calls after every trial, and ends when that throws', () => {
    const seen: number[] = [];
    const stop = () =>
      runPoint(qpskJob({ check: { symbols: 100 } }), 0, (done) => {
        seen.push(done);
        if (done === 3) throw new Error('cancelled');
      });
    expect(stop).toThrow('cancelled');
    expect(seen).toEqual([1, 2, 3]);
  });

  it('names a point outside the grid', () => {
    expect(() => runPoint(qpskJob(), 1)).toThrow(expect.objectContaining({ parameter: 'point' }));
  });
});
