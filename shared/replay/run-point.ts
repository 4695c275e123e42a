import type { ReplayPoint } from '../model/replay-point';
import { pointAt, type ReplayJob } from './job';
import { NodeChecksum } from './node-checksum';
import { settledSymbols, type TrialResult } from './phase-watch';
import { powerOf, runTrial } from './receiver';
import { clopperPearson, pointVerdict } from './verdict';

/**
 * Runs every trial of one point. The result depends on the job and the index alone: not on other points, on their
 * order, on the worker or on the machine.
 *
 * @param onTrial called after every trial with the number done; what it throws ends the point
 * @throws {ParameterError} for an index outside the grid
 */
export function runPoint(job: ReplayJob, pointIndex: number, onTrial?: (done: number) => void): ReplayPoint {
  const point = pointAt(job, pointIndex);
  const checksum = new NodeChecksum();
  const results: TrialResult[] = [];
  for (let trial = 0; trial < job.check.trials; trial++) {
    const watch = runTrial(job, pointIndex, trial, ({ nodes, count }) => checksum.add(nodes, count));
    results.push(watch.result());
    onTrial?.(trial + 1);
  }
  const { trials, limits } = job.check;
  const locked = results.filter(({ outcome }) => outcome === 'locked');
  const interval = clopperPearson({ successes: locked.length, trials, confidence: limits.confidence });
  return {
    ...point,
    trials,
    locks: locked.length,
    falseLocks: results.filter(({ outcome }) => outcome === 'false-lock').length,
    lockProbability: { estimate: locked.length / trials, ...interval },
    lockTimeSymbols: lockTimes(locked),
    ...settledFigures(job, locked),
    cycleSlips: results.reduce((sum, { cycleSlips }) => sum + cycleSlips, 0),
    verdict: pointVerdict(interval, limits.lockProbability),
    checksum: checksum.digits(),
  };
}

/** Nearest-rank percentiles of the lock times. */
function lockTimes(locked: readonly TrialResult[]): ReplayPoint['lockTimeSymbols'] {
  if (locked.length === 0) return null;
  const sorted = locked.map(({ lockTimeSymbols }) => lockTimeSymbols).sort((a, b) => a - b);
  const rank = (percent: number) => sorted[Math.ceil((percent * sorted.length) / 100) - 1]!;
  return { p50: rank(50), p95: rank(95) };
}

/** Residual offset, jitter and bias over the settled parts of the trials that locked, taken together. */
function settledFigures(job: ReplayJob, locked: readonly TrialResult[]) {
  if (locked.length === 0) return { residualOffsetHz: null, phaseJitterDeg: null, phaseBiasDeg: null };
  const total = (of: (result: TrialResult) => number) => locked.reduce((sum, result) => sum + of(result), 0);
  const count = locked.length * settledSymbols(job.check.symbols);
  const mean = total(({ errorSum }) => errorSum) / count;
  const variance = Math.max(0, total(({ errorSquares }) => errorSquares) / count - mean * mean);
  const degrees = 360 / powerOf(job);
  return {
    residualOffsetHz: (total(({ residualTurns }) => residualTurns) / locked.length) * job.symbolRateBd,
    phaseJitterDeg: Math.sqrt(variance) * degrees,
    phaseBiasDeg: mean * degrees,
  };
}
