import { add, divide, multiply, toDoubleDouble } from '../math/double-double';
import type { DoubleDouble } from '../math/double-double';
import type { LinearLoop } from '../loop/linear-loop';
import { at, closedLoopPolynomial, fromTerms, plainInZ, subtractProducts } from '../loop/noise-bandwidth';
import type { Polynomial } from '../loop/noise-bandwidth';

/** Where noise enters a loop: on its error, on the oscillator's word, or into its first or second integrator. */
export type NoiseEntry = 'error' | 'word' | 'integrator' | 'integrator2';

/** Stationary noise: its autocovariance at lags of 0, 1, 2 … updates, one entry where it is white. */
export interface LoopNoise {
  entry: NoiseEntry;
  covariance: readonly number[];
}

/**
 * Variance that noises leave on the oscillator phase, one value for each: Σ_l c[l]·r[l] over all lags of both signs,
 * with r the autocorrelation of the impulse response from the entry to the phase. Noise on the error is in units of
 * the phase (over Kd) and does not pass the averaging that the phase does; noise at the other entries is in phase per
 * update, and the integrators sum it up.
 *
 * The integral of B(z)·C(1/z)/(A(z)·A(1/z)) round the circle with C = Σ c[l]·z^l·B, exact, by the recursion of
 * `noiseBandwidth` with two numerators.
 *
 * @returns null for an unstable loop, or one without gain
 * @see K. J. Åström, "Introduction to Stochastic Control Theory", 1970, chapter 5
 */
export function loopVariances(loop: LinearLoop, noises: readonly LoopNoise[]): number[] | null {
  if (loop.order === 0) return null;
  const denominator = closedLoopPolynomial(loop);
  const entries = [...new Set(noises.filter(isThere).map(({ entry }) => entry))];
  const terms = new Map(entries.map((entry) => [entry, numeratorOf(loop, entry)]));
  const reach = ({ entry, covariance }: LoopNoise): number => (terms.get(entry)?.length ?? 0) + covariance.length - 1;
  const length = Math.max(denominator.high.length, ...noises.map(reach));
  const forms = entries.map((entry) => formOf(terms.get(entry) as DoubleDouble[], noisesAt(noises, entry), length));
  if (!integrate(padded(denominator, length), forms)) return null;
  return noises.map((noise) => varianceOf(noise, forms[entries.indexOf(noise.entry)]));
}

export const isThere = ({ covariance }: LoopNoise): boolean => covariance.some((value) => value !== 0);
export const isWhite = ({ covariance }: LoopNoise): boolean => covariance.length === 1;
const noisesAt = (noises: readonly LoopNoise[], entry: NoiseEntry): LoopNoise[] =>
  noises.filter((noise) => noise.entry === entry && isThere(noise));

function varianceOf(noise: LoopNoise, form: Form | undefined): number {
  if (!form || !isThere(noise)) return 0;
  if (isWhite(noise)) return (noise.covariance[0] as number) * form.energy.high;
  return (form.weighted.find(({ of }) => of === noise) as Weighted).energy.high;
}

/** The numerator over z^E·(z − 1)^n + M, but for a power of z, which turns no modulus. */
function numeratorOf(loop: LinearLoop, entry: NoiseEntry): DoubleDouble[] {
  if (entry === 'error') return plainInZ(loop);
  const integrators = { word: 1, integrator: 2, integrator2: 3 }[entry];
  const factors = [[1], [1, -1], [1, -2, 1]][loop.order - integrators];
  return (factors ?? []).map(toDoubleDouble);
}

/** One entry: its numerator B, and for each coloured noise the numerator C. */
interface Form {
  plain: Polynomial;
  /** Σ r[0] of the entry. */
  energy: DoubleDouble;
  weighted: Weighted[];
}

interface Weighted {
  of: LoopNoise;
  polynomial: Polynomial;
  energy: DoubleDouble;
}

function formOf(terms: DoubleDouble[], noises: LoopNoise[], length: number): Form {
  const coloured = noises.filter((noise) => !isWhite(noise));
  return {
    plain: fromTerms(terms, length, 0),
    energy: toDoubleDouble(0),
    weighted: coloured.map((of) => ({ of, polynomial: weightedBy(of, terms, length), energy: toDoubleDouble(0) })),
  };
}

/** Σ c[l]·z^l·B, the lags of both signs together. */
function weightedBy({ covariance }: LoopNoise, terms: DoubleDouble[], length: number): Polynomial {
  const weighted = fromTerms([], length, 0);
  covariance.forEach((value, lag) => {
    const share = toDoubleDouble(lag === 0 ? value : 2 * value);
    terms.forEach((term, i) => accumulate(weighted, length - terms.length + i - lag, multiply(term, share)));
  });
  return weighted;
}

function accumulate(polynomial: Polynomial, place: number, term: DoubleDouble): void {
  const { high, low } = add(at(polynomial, place), term);
  polynomial.high[place] = high;
  polynomial.low[place] = low;
}

/** A polynomial times a power of z. */
function padded({ high, low }: Polynomial, length: number): Polynomial {
  const wider = { high: new Float64Array(length), low: new Float64Array(length) };
  wider.high.set(high);
  wider.low.set(low);
  return wider;
}

/** Takes every energy, one degree after the other; false when a pole is not inside the circle. */
function integrate(a: Polynomial, forms: Form[]): boolean {
  const perLead = divide(toDoubleDouble(1), at(a, 0));
  const reversed = fromTerms([], a.high.length, 0);
  for (let k = a.high.length - 1; k >= 0; k -= 1) {
    const top = at(a, 0);
    if (!(top.high > 0)) return false;
    reverseInto(reversed, a, k);
    const perTop = divide(toDoubleDouble(1), top);
    const perLast = multiply(perTop, perLead);
    for (const form of forms) {
      const own = at(form.plain, k);
      form.energy = add(form.energy, multiply(multiply(own, own), perLast));
      for (const each of form.weighted) {
        const other = at(each.polynomial, k);
        each.energy = add(each.energy, multiply(multiply(own, other), perLast));
        subtractProducts(each.polynomial, multiply(other, perTop), reversed, k);
      }
      subtractProducts(form.plain, multiply(own, perTop), reversed, k);
    }
    subtractProducts(a, multiply(at(a, k), perTop), reversed, k);
  }
  return true;
}

/** The first k + 1 coefficients in reverse. */
function reverseInto(reversed: Polynomial, { high, low }: Polynomial, k: number): void {
  for (let i = 0; i <= k; i += 1) {
    reversed.high[i] = high[k - i] as number;
    reversed.low[i] = low[k - i] as number;
  }
}
