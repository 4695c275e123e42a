import { commonUnit, moveDecimals, numberText } from '../../../shared/quantities/format';

/** One unit for all offsets of a check, so that they can be compared at a glance. */
export interface OffsetScale {
  /** Hz with its prefix: kHz. */
  unit: string;
  /** Digits behind the point that every offset of the check gets. */
  decimals: number;
  /** Value in that unit. */
  of: (hertz: number) => number;
  /** Text without its unit, with a sign when it is not 0. */
  text: (hertz: number) => string;
}

const finest = 3;

/** @param offsetsHz every offset that will be shown; the largest sets the unit, the finest the digits */
export function offsetScale(offsetsHz: readonly number[]): OffsetScale {
  const largest = Math.max(0, ...offsetsHz.map(Math.abs));
  const { unit, exponent } = commonUnit(offsetsHz, 'Hz');
  const of = (hertz: number) => moveDecimals(hertz, -exponent);
  const decimals = Math.max(0, ...offsetsHz.map((hertz) => digitsNeeded(of(hertz), of(largest))));
  return { unit, decimals, of, text: (hertz) => numberText(of(hertz), { decimals, sign: true }) };
}

function digitsNeeded(value: number, largest: number): number {
  for (let digits = 0; digits < finest; digits += 1) {
    if (Math.abs(Number(value.toFixed(digits)) - value) <= 1e-9 * largest) return digits;
  }
  return finest;
}
