import { ParameterError } from '../parameter-error';

/** Coefficients of the analog form s³ + b3·ω0·s² + a3·ω0²·s + ω0³ of a loop of order 3. */
export interface ThirdOrderForm {
  a3: number;
  b3: number;
}

/**
 * The published pair.
 *
 * @see E. Kaplan, C. Hegarty, "Understanding GPS", loop filter table
 */
export const publishedForm: ThirdOrderForm = { a3: 1.1, b3: 2.4 };

/** The noise bandwidth that the same table prints for its pair, over ω0. */
const publishedBandwidth = 0.7845;

/**
 * Noise bandwidth Bn/ω0 of the analog loop. The published pair keeps the four digits of its table, so that gains agree
 * with everybody else's; the closed form, which gives 0.784451 there, serves any other pair.
 *
 *     Bn/ω0 = (a3·b3² + a3² − b3) / (4·(a3·b3 − 1))
 *
 * @see the integral of |H(jω)|² by residues, for example W. C. Lindsey, M. K. Simon, "Telecommunication Systems
 *   Engineering", 1973, table of loop bandwidths
 */
export function thirdOrderBandwidth({ a3, b3 }: ThirdOrderForm): number {
  if (a3 === publishedForm.a3 && b3 === publishedForm.b3) return publishedBandwidth;
  return (a3 * b3 ** 2 + a3 ** 2 - b3) / (4 * (a3 * b3 - 1));
}

/**
 * @param pointer JSON pointer of the form in its plan
 * @throws {ParameterError} at `a3` when the analog loop would not be stable (Hurwitz: a3·b3 above 1)
 */
export function requireStableForm({ a3, b3 }: ThirdOrderForm, pointer: string): void {
  if (a3 * b3 > 1) return;
  throw new ParameterError(`${pointer}/a3`, 'the analog loop is stable only when a3 times b3 is above 1');
}
