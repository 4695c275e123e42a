import type { ClockWords } from '../model/words';
import { ParameterError } from '../parameter-error';
import type { Ratio } from './exact-ratio';

/** Coefficients for the samples n = −1, 0, 1, 2 at one fraction. */
export type Taps = [number, number, number, number];

/** Taps of each fraction μ/2^F, μ = 0 … 2^F − 1, in units of 2^−(Wt−2). */
export interface InterpolatorTable {
  coefficients: Taps[];
}

/** Interpolators whose coefficients are polynomials of the fraction. */
export type PolynomialInterpolator = Exclude<ClockWords['interpolator'], 'polyphase'>;

/** Polynomials of the taps in μ, constant first, over a common denominator. */
export const tapPolynomials: Record<PolynomialInterpolator, { over: bigint; taps: bigint[][] }> = {
  linear: { over: 1n, taps: [[0n], [1n, -1n], [0n, 1n], [0n]] },
  // Piecewise parabola with the free parameter ½.
  parabolic: {
    over: 2n,
    taps: [
      [0n, -1n, 1n],
      [2n, -1n, -1n],
      [0n, 3n, -1n],
      [0n, -1n, 1n],
    ],
  },
  // Lagrange through the four samples.
  cubic: {
    over: 6n,
    taps: [
      [0n, -2n, 3n, -1n],
      [6n, -3n, -6n, 3n],
      [0n, 6n, 3n, -3n],
      [0n, -1n, 0n, 1n],
    ],
  },
};

/**
 * Interpolator coefficients times 2^(Wt−2) to the nearest integer, a half to the even one, worked out in fractions; a
 * polyphase bank has them in its words.
 *
 * @throws {ParameterError} naming `taps` when the words of a polyphase bank lack them
 * @see F. Gardner, L. Erup, R. Harris, "Interpolation in digital modems", IEEE Trans. Commun. 41 (1993)
 */
export function interpolatorTable({ interpolator, taps, tableBits, counter }: TableWords): InterpolatorTable {
  const fractions = 2 ** counter.fractionBits;
  if (interpolator !== 'polyphase') return { coefficients: polynomialTable(interpolator, tableBits, fractions) };
  if (taps?.length !== fractions) throw new ParameterError('taps', `a bank of ${fractions} fractions needs its table`);
  return { coefficients: taps as Taps[] };
}

type TableWords = Pick<ClockWords, 'interpolator' | 'taps' | 'tableBits'> & {
  counter: Pick<ClockWords['counter'], 'fractionBits'>;
};

function polynomialTable(interpolator: PolynomialInterpolator, tableBits: number, fractions: number): Taps[] {
  const { over, taps } = tapPolynomials[interpolator];
  const unit = 1n << BigInt(tableBits - 2);
  const tap = (polynomial: bigint[], mu: number) => {
    const { numerator, denominator } = valueAt(polynomial, BigInt(mu), BigInt(fractions));
    return Number(nearestEven({ numerator: numerator * unit, denominator: denominator * over }));
  };
  return Array.from({ length: fractions }, (_, mu) => taps.map((each) => tap(each, mu)) as Taps);
}

/** The coefficients of a bank as integers of 2^−(Wt−2), to nearest, a half to the even one. */
export const bankTable = (bank: readonly (readonly number[])[], tableBits: number): Taps[] =>
  bank.map((taps) => taps.map((tap) => roundedEven(tap * 2 ** (tableBits - 2))) as Taps);

function roundedEven(value: number): number {
  const floor = Math.floor(value);
  const rest = value - floor;
  return (rest > 0.5 || (rest === 0.5 && floor % 2 !== 0) ? floor + 1 : floor) + 0;
}

/** Polynomial at μ/2^F by Horner's rule over a growing denominator. */
function valueAt(polynomial: readonly bigint[], mu: bigint, fractions: bigint): Ratio {
  let numerator = 0n;
  let denominator = 1n;
  for (const coefficient of [...polynomial].reverse()) {
    numerator = numerator * mu + coefficient * denominator * fractions;
    denominator *= fractions;
  }
  return { numerator, denominator };
}

function nearestEven({ numerator, denominator }: Ratio): bigint {
  const magnitude = numerator < 0n ? -numerator : numerator;
  const floor = magnitude / denominator;
  const twice = 2n * (magnitude % denominator);
  const up = twice > denominator || (twice === denominator && floor % 2n === 1n);
  const rounded = up ? floor + 1n : floor;
  return numerator < 0n ? -rounded : rounded;
}
