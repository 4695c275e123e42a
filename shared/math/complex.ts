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
  let [re, im, squareRe, squareIm] = [1, 0, a[0], a[1]];
  for (let rest = exponent; rest > 0; rest = Math.floor(rest / 2)) {
    if (rest % 2 === 1) [re, im] = [re * squareRe - im * squareIm, re * squareIm + im * squareRe];
    [squareRe, squareIm] = [squareRe * squareRe - squareIm * squareIm, 2 * squareRe * squareIm];
  }
  return [re, im];
}

/** Value and slope of a polynomial, coefficients real and constant first (Horner). */
export function evaluatePolynomial(
  coefficients: readonly number[],
  [re, im]: Complex,
): { value: Complex; slope: Complex } {
  let [valueRe, valueIm, slopeRe, slopeIm] = [0, 0, 0, 0];
  for (let k = coefficients.length - 1; k >= 0; k -= 1) {
    const nextSlope = slopeRe * re - slopeIm * im + valueRe;
    slopeIm = slopeRe * im + slopeIm * re + valueIm;
    slopeRe = nextSlope;
    const nextValue = valueRe * re - valueIm * im + (coefficients[k] as number);
    valueIm = valueRe * im + valueIm * re;
    valueRe = nextValue;
  }
  return { value: [valueRe, valueIm], slope: [slopeRe, slopeIm] };
}
