/** Unevaluated sum high + low of two doubles, about 31 significant digits. */
export interface DoubleDouble {
  high: number;
  low: number;
}

/** Splits a double into two halves of 26 bits (Veltkamp). */
export const splitter = 2 ** 27 + 1;

/** The exact sum of two doubles (D. Knuth, The Art of Computer Programming, vol. 2, 4.2.2). */
export function exactSum(a: number, b: number): DoubleDouble {
  const high = a + b;
  const part = high - a;
  return { high, low: a - (high - part) + (b - part) };
}

/** The exact product of two doubles whose halves do not overflow (T. Dekker 1971). */
export function exactProduct(a: number, b: number): DoubleDouble {
  const high = a * b;
  const aShifted = splitter * a;
  const aHigh = aShifted - (aShifted - a);
  const aLow = a - aHigh;
  const bShifted = splitter * b;
  const bHigh = bShifted - (bShifted - b);
  const bLow = b - bHigh;
  return { high, low: aHigh * bHigh - high + aHigh * bLow + aLow * bHigh + aLow * bLow };
}

export function add(a: DoubleDouble, b: DoubleDouble): DoubleDouble {
  const sum = exactSum(a.high, b.high);
  return exactSum(sum.high, sum.low + (a.low + b.low));
}

export function multiply(a: DoubleDouble, b: DoubleDouble): DoubleDouble {
  const product = exactProduct(a.high, b.high);
  return exactSum(product.high, product.low + (a.high * b.low + a.low * b.high));
}

export function divide(a: DoubleDouble, b: DoubleDouble): DoubleDouble {
  const first = a.high / b.high;
  const rest = add(a, negate(multiply(exactSum(first, 0), b)));
  const second = rest.high / b.high;
  const last = add(rest, negate(multiply(exactSum(second, 0), b)));
  return add(exactSum(first, second), exactSum(last.high / b.high, 0));
}

export const negate = ({ high, low }: DoubleDouble): DoubleDouble => ({ high: -high, low: -low });

export const toDoubleDouble = (value: number): DoubleDouble => ({ high: value, low: 0 });
