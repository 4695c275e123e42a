import { tapPolynomials } from '../fixed-point/interpolator-table';
import type { CompleteClock } from '../plan/complete';
import { polyphaseTaps } from './polyphase-bank';
import type { BankSignal } from './polyphase-bank';

export type InterpolatorName = CompleteClock['interpolator'];

/** Coefficients of an interpolator for the samples n = −1, 0, 1, 2 at any fraction μ, 0 to 1, unrounded. */
export function interpolatorTaps(interpolator: InterpolatorName, signal: BankSignal): (mu: number) => number[] {
  if (interpolator === 'polyphase') return polyphaseTaps(signal);
  const { over, taps } = tapPolynomials[interpolator];
  const polynomials = taps.map((each) => each.map((coefficient) => Number(coefficient) / Number(over)));
  return (mu) => polynomials.map((each) => each.reduceRight((value, coefficient) => value * mu + coefficient, 0));
}
