import type { ReplayPoint } from '../model/replay-point';
import type { ReplayJob } from './job';

/**
 * What the digest of a replay is taken over, as canonical JSON: the job, the engine, and of every point in the order
 * of the grid the counts, the lock times and the checksum over all datapath nodes. They are integers that no machine
 * gives otherwise; figures worked out from them in floating point stay outside.
 */
export function digestContent(job: ReplayJob, engineVersion: string, points: readonly ReplayPoint[]) {
  const ordered = [...points].sort((a, b) => a.index - b.index);
  return {
    engine: engineVersion,
    job,
    points: ordered.map(({ index, trials, locks, falseLocks, lockTimeSymbols, cycleSlips, checksum }) => ({
      index,
      trials,
      locks,
      falseLocks,
      lockTimeSymbols,
      cycleSlips,
      checksum,
    })),
  };
}
