import { add, divide, multiply, negate, splitter, toDoubleDouble } from '../math/double-double';
import type { DoubleDouble } from '../math/double-double';
import type { LinearLoop } from './linear-loop';

/** A polynomial in z, highest power first, in double-double. */
export interface Polynomial {
  high: Float64Array;
  low: Float64Array;
}

/**
 * One-sided noise bandwidth Bn·Tu = ½ Σ h[n]² of the closed loop H = L/(1 + L), delay included, cycles per update.
 *
 * Parseval's integral is taken through the recursion that reduces the closed-loop polynomial by one degree at a
 * time, which is also Jury's test: the loop is stable exactly when every leading coefficient stays above 0. The
 * recursion is run in double-double because a polynomial in z forgets slow poles: what is lost in doubles is
 * 1e−16/(ωnTu)² of the result.
 *
 * @returns null for an unstable loop, or one without gain
 * @see K. J. Åström, "Introduction to Stochastic Control Theory", 1970, chapter 5
 * @example order 2, D = 0, g1 = 300/11401, g2 = 4/11401 // => 0.01008919
 */
export function noiseBandwidth(loop: LinearLoop): number | null {
  if (loop.order === 0) return null;
  const energy = impulseEnergy(closedLoopPolynomial(loop), forwardInZ(loop));
  return energy === null ? null : energy / 2;
}

/** Whether every closed-loop pole lies inside the unit circle. */
export const isStable = (loop: LinearLoop): boolean => noiseBandwidth(loop) !== null;

/** Σ h[n]² of numerator/denominator, numerator of the lower degree; null when a pole is not inside the circle. */
function impulseEnergy(denominator: Polynomial, numerator: DoubleDouble[]): number | null {
  const degree = denominator.high.length - 1;
  const a = denominator;
  const b = fromTerms(numerator, degree + 1, 0);
  const lead = at(a, 0);
  let sum = toDoubleDouble(0);
  for (let k = degree; k > 0; k -= 1) {
    if (!(at(a, 0).high > 0)) return null;
    const beta = divide(at(b, k), at(a, 0));
    const alpha = divide(at(a, k), at(a, 0));
    sum = add(sum, multiply(at(b, k), beta));
    reduce(a, b, { alpha, beta, degree: k });
  }
  if (!(at(a, 0).high > 0)) return null;
  const energy = divide(add(sum, divide(multiply(at(b, 0), at(b, 0)), at(a, 0))), lead).high;
  return Number.isFinite(energy) && energy > 0 ? energy : null;
}

/** a_i ← a_i − α·a_(k−i) and b_i ← b_i − β·a_(k−i) with the a of before, i below k. */
function reduce(
  a: Polynomial,
  b: Polynomial,
  { alpha, beta, degree }: { alpha: DoubleDouble; beta: DoubleDouble; degree: number },
): void {
  const reversed = { high: a.high.slice(0, degree + 1).reverse(), low: a.low.slice(0, degree + 1).reverse() };
  subtractProducts(a, alpha, reversed, degree);
  subtractProducts(b, beta, reversed, degree);
}

/** target_i ← target_i − factor·source_i, the exact product and sum of `double-double` written out for speed. */
export function subtractProducts(target: Polynomial, factor: DoubleDouble, source: Polynomial, count: number): void {
  const shifted = splitter * factor.high;
  const factorHigh = shifted - (shifted - factor.high);
  const factorLow = factor.high - factorHigh;
  for (let i = 0; i < count; i += 1) {
    const value = source.high[i] as number;
    const valueShifted = splitter * value;
    const valueHigh = valueShifted - (valueShifted - value);
    const valueLow = value - valueHigh;
    const product = factor.high * value;
    const error =
      factorHigh * valueHigh - product + factorHigh * valueLow + factorLow * valueHigh + factorLow * valueLow;
    const low = error + (factor.high * (source.low[i] as number) + factor.low * value);
    const before = target.high[i] as number;
    const sum = before - product;
    const part = sum - before;
    const rest = before - (sum - part) + (-product - part) + ((target.low[i] as number) - low);
    target.high[i] = sum + rest;
    target.low[i] = rest - ((target.high[i] as number) - sum);
  }
}

export const at = ({ high, low }: Polynomial, i: number): DoubleDouble => ({
  high: high[i] as number,
  low: low[i] as number,
});

/** Terms from a power downward, laid into a polynomial of `length` coefficients that ends at power `lowest`. */
export function fromTerms(terms: DoubleDouble[], length: number, lowest: number): Polynomial {
  const polynomial = { high: new Float64Array(length), low: new Float64Array(length) };
  terms.forEach(({ high, low }, i) => {
    polynomial.high[length - lowest - terms.length + i] = high;
    polynomial.low[length - lowest - terms.length + i] = low;
  });
  return polynomial;
}

/** z^E·(z − 1)^n + M(z). */
export function closedLoopPolynomial(loop: LinearLoop): Polynomial {
  const exponent = loop.delay + (loop.averaged > 1 ? 1 : 0);
  const integrators = [[1], [1, -1], [1, -2, 1], [1, -3, 3, -1]][loop.order] as number[];
  const forward = forwardInZ(loop);
  const length = exponent + loop.order + 1;
  const polynomial = fromTerms(integrators.map(toDoubleDouble), length, exponent);
  forward.forEach((term, i) => {
    const place = length - forward.length + i;
    const { high, low } = add(at(polynomial, place), term);
    polynomial.high[place] = high;
    polynomial.low[place] = low;
  });
  return polynomial;
}

/** M as a polynomial in z, highest power first, exact: Σ g_m·(z − 1)^(n−m)·z^(m−1), times a·z + 1 − a. */
function forwardInZ(loop: LinearLoop): DoubleDouble[] {
  const plain = plainInZ(loop);
  if (loop.averaged <= 1) return plain;
  const now = divide(toDoubleDouble(loop.averaged + 1), toDoubleDouble(2 * loop.averaged));
  const before = divide(toDoubleDouble(loop.averaged - 1), toDoubleDouble(2 * loop.averaged));
  return [...plain, toDoubleDouble(0)].map((term, i) =>
    add(multiply(term, now), multiply(plain[i - 1] ?? toDoubleDouble(0), before)),
  );
}

/** Σ g_m·(z − 1)^(n−m)·z^(m−1) in z, highest power first, exact. */
export function plainInZ({ gains, order }: LinearLoop): DoubleDouble[] {
  const [g1, g2, g3] = [gains.g1, gains.g2, gains.g3].map(toDoubleDouble) as [DoubleDouble, DoubleDouble, DoubleDouble];
  if (order === 3) return [add(add(g1, g2), g3), negate(add(add(g1, g1), g2)), g1];
  if (order === 2) return [add(g1, g2), negate(g1)];
  return [g1];
}
