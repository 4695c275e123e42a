import betaQuantile from '@stdlib/stats-base-dists-beta-quantile';
import type { ReplayPoint } from '../model/replay-point';
import { ParameterError } from '../parameter-error';

export type Verdict = ReplayPoint['verdict'];

export interface Proportion {
  /** Trials that locked, a whole number, 0 to `trials`. */
  successes: number;
  /** Trials run, 1 or more. */
  trials: number;
  /** Confidence of the two-sided interval, between 0 and 1. */
  confidence: number;
}

/** Ends of an interval of a probability. */
export interface Interval {
  lower: number;
  upper: number;
}

/**
 * Exact two-sided interval of a binomial probability: with α = 1 − confidence the quantiles α/2 of B(k, n − k + 1)
 * and 1 − α/2 of B(k + 1, n − k); 0 and 1 at the ends.
 *
 * @throws {ParameterError} naming the first field out of range
 * @see C. Clopper, E. Pearson, Biometrika 26 (1934)
 * @example clopperPearson({ successes: 400, trials: 400, confidence: 0.95 }) // => { lower: 0.99082…, upper: 1 }
 */
export function clopperPearson({ successes, trials, confidence }: Proportion): Interval {
  if (!(Number.isInteger(trials) && trials >= 1)) throw new ParameterError('trials', 'trials must be 1 or more');
  if (!(Number.isInteger(successes) && successes >= 0 && successes <= trials)) {
    throw new ParameterError('successes', 'successes must lie between 0 and the trials');
  }
  if (!(confidence > 0 && confidence < 1))
    throw new ParameterError('confidence', 'confidence must lie between 0 and 1');
  const tail = (1 - confidence) / 2;
  return {
    lower: successes === 0 ? 0 : betaQuantile(tail, successes, trials - successes + 1),
    upper: successes === trials ? 1 : betaQuantile(1 - tail, successes + 1, trials - successes),
  };
}

/** Pass when the whole interval reaches the limit, fail when all of it stays below; else there are not enough trials to say. */
export function pointVerdict({ lower, upper }: Interval, lockProbability: number): Verdict {
  if (lower >= lockProbability) return 'pass';
  return upper < lockProbability ? 'fail' : 'undecided';
}

/** Fail when any point fails, pass when every point of the grid is there and passes, undecided otherwise. */
export function overallVerdict(points: readonly Pick<ReplayPoint, 'verdict'>[], pointCount: number): Verdict {
  if (points.some(({ verdict }) => verdict === 'fail')) return 'fail';
  return points.length === pointCount && points.every(({ verdict }) => verdict === 'pass') ? 'pass' : 'undecided';
}
