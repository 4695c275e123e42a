import type { CompletePlan } from '../plan/complete';
import { largestMagnitude } from './modulations';
import { tapAt } from './offset-interference';

/** Symbols on either side whose share of a half-way sample is added up. */
const neighbours = 12;

/**
 * Largest magnitude of a noiseless sample at the phase error detector over the amplitude A: that of the outermost
 * points; with OQPSK one rail is between its symbols, where a sum of |g(k + ½)| can overshoot.
 */
export function largestSample({ modulation, ringRatios, rollOff }: CompletePlan['signal']): number {
  if (modulation !== 'OQPSK') return largestMagnitude(modulation, ringRatios);
  let sum = 0;
  for (let k = 0; k < neighbours; k += 1) sum += 2 * Math.abs(tapAt(k, rollOff));
  return Math.SQRT1_2 * Math.hypot(1, sum);
}
