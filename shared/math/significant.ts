/** Values that rounding put a hair off the number they stand for still count as it. */
const hair = 1e-9;

const unitOf = (value: number, digits: number): number => 10 ** (Math.floor(Math.log10(value)) - digits + 1);

/**
 * Largest number of so many significant digits that is not above the value.
 *
 * @param value above 0
 * @example significantDown(0.01239, 2) // => 0.012
 */
export function significantDown(value: number, digits: number): number {
  const unit = unitOf(value, digits);
  return Number((Math.floor(value / unit + hair) * unit).toPrecision(digits));
}

/** Smallest number of so many significant digits that is not below the value, which is above 0. */
export function significantUp(value: number, digits: number): number {
  const unit = unitOf(value, digits);
  return Number((Math.ceil(value / unit - hair) * unit).toPrecision(digits));
}
