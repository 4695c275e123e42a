import { ParameterError } from '../parameter-error';

/** What a point of a tolerance check must prove. */
export interface ProofLimits {
  /** Least probability of lock, 0 to 1. */
  lockProbability: number;
  /** Confidence of the two-sided Clopper–Pearson interval, above 0 and below 1. */
  confidence: number;
}

/**
 * Fewest trials with which a point can pass: with fewer, even a lock in every trial leaves the lower end of the
 * interval below the limit. When all n trials lock that end is (α/2)^(1/n), α = 1 − confidence, so
 *
 *     n = ⌈ln(α/2) / ln(lockProbability)⌉
 *
 * @returns a whole number, 1 or more; Infinity for a probability of 1, which no number of trials proves
 * @throws {ParameterError} for a probability outside 0 … 1 or a confidence not between 0 and 1
 * @see C. Clopper, E. Pearson, Biometrika 26 (1934): the exact interval, here at its closed end
 * @example leastTrials({ lockProbability: 0.99, confidence: 0.95 }) // => 368
 */
export function leastTrials({ lockProbability, confidence }: ProofLimits): number {
  if (!(lockProbability >= 0 && lockProbability <= 1)) {
    throw new ParameterError('lockProbability', 'lockProbability must lie between 0 and 1');
  }
  if (!(confidence > 0 && confidence < 1)) {
    throw new ParameterError('confidence', 'confidence must lie between 0 and 1');
  }
  if (lockProbability === 0) return 1;
  if (lockProbability === 1) return Infinity;
  return Math.max(1, Math.ceil(Math.log((1 - confidence) / 2) / Math.log(lockProbability)));
}
