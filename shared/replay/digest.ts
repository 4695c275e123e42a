import type { ReplayPoint } from '../model/replay-point';
import type { ReplayJob } from './job';

/**
 * What the digest of a replay is taken over, as canonical JSON: the job, the engine, and all that a point measured, in
 * the order of the grid, with the checksum over all its datapath nodes. Every figure comes from + − × ÷ and √, which
 * IEEE 754 fixes, so no machine gives another. What follows from the counts by way of a library, the interval and the
 * verdict, stays outside.
 */
export function digestContent(job: ReplayJob, engineVersion: string, points: readonly ReplayPoint[]) {
  const ordered = [...points].sort((a, b) => a.index - b.index);
  return { engine: engineVersion, job, points: ordered.map(measured) };
}

const measured = (point: ReplayPoint) => ({
  index: point.index,
  trials: point.trials,
  locks: point.locks,
  falseLocks: point.falseLocks,
  lockTimeSymbols: point.lockTimeSymbols,
  residualOffsetHz: point.residualOffsetHz,
  phaseJitterDeg: point.phaseJitterDeg,
  phaseBiasDeg: point.phaseBiasDeg,
  cycleSlips: point.cycleSlips,
  checksum: point.checksum,
});
