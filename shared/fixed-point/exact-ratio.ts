import { ParameterError } from '../parameter-error';

/** A fraction of integers, denominator above 0. */
export interface Ratio {
  numerator: bigint;
  denominator: bigint;
}

/** The exact value of a finite double as a fraction whose denominator is a power of two. */
export function exactRatio(value: number): Ratio {
  if (!Number.isFinite(value)) throw new ParameterError('value', 'value must be a finite number');
  let scaled = value;
  let exponent = 0n;
  while (!Number.isInteger(scaled)) {
    scaled *= 2;
    exponent += 1n;
  }
  return { numerator: BigInt(scaled), denominator: 1n << exponent };
}

export const product = (a: Ratio, b: Ratio): Ratio => ({
  numerator: a.numerator * b.numerator,
  denominator: a.denominator * b.denominator,
});

/** a/b, for b above 0. */
export const quotient = (a: Ratio, b: Ratio): Ratio => ({
  numerator: a.numerator * b.denominator,
  denominator: a.denominator * b.numerator,
});

/** Largest integer that is not above the fraction. */
export function floorOf({ numerator, denominator }: Ratio): bigint {
  const truncated = numerator / denominator;
  return numerator % denominator < 0n ? truncated - 1n : truncated;
}

/** Nearest integer, a half up. */
export const nearestOf = ({ numerator, denominator }: Ratio): bigint =>
  floorOf({ numerator: 2n * numerator + denominator, denominator: 2n * denominator });
