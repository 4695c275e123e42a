/** A complex number as [re, im]; loops over many of them keep the parts in two arrays instead. */
export type Complex = readonly [re: number, im: number];

export const multiply = (a: Complex, b: Complex): Complex => [a[0] * b[0] - a[1] * b[1], a[0] * b[1] + a[1] * b[0]];

export const add = (a: Complex, b: Complex): Complex => [a[0] + b[0], a[1] + b[1]];

export const subtract = (a: Complex, b: Complex): Complex => [a[0] - b[0], a[1] - b[1]];

export const squaredModulus = (a: Complex): number => a[0] * a[0] + a[1] * a[1];

export function divide(a: Complex, b: Complex): Complex {
  const scale = squaredModulus(b);
  return [(a[0] * b[0] + a[1] * b[1]) / scale, (a[1] * b[0] - a[0] * b[1]) / scale];
}

/** a to a whole power, not negative, by squaring. */
export function power(a: Complex, exponent: number): Complex {
  let [result, square, rest]: [Complex, Complex, number] = [[1, 0], a, exponent];
  while (rest > 0) {
    if (rest % 2 === 1) result = multiply(result, square);
    square = multiply(square, square);
    rest = Math.floor(rest / 2);
  }
  return result;
}

/** Value and slope of a polynomial, coefficients real and constant first (Horner). */
export function evaluatePolynomial(coefficients: readonly number[], at: Complex): { value: Complex; slope: Complex } {
  let [value, slope]: [Complex, Complex] = [
    [0, 0],
    [0, 0],
  ];
  for (let k = coefficients.length - 1; k >= 0; k -= 1) {
    slope = add(multiply(slope, at), value);
    value = add(multiply(value, at), [coefficients[k] as number, 0]);
  }
  return { value, slope };
}
