import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { add, divide, exactProduct, exactSum, multiply, toDoubleDouble } from '../../../shared/math/double-double';

/** A double as an exact whole number of 2^−1200ths would be too long; products of 40-bit integers are enough. */
const whole = fc.maxSafeInteger();
const short = fc.integer({ min: -(2 ** 31), max: 2 ** 31 - 1 });

describe('exactSum and exactProduct', () => {
  // BigInt is exact.
  it('lose nothing', () => {
    fc.assert(
      fc.property(whole, whole, (a, b) => {
        const sum = exactSum(a, b);
        const product = exactProduct(a, b);
        expect(BigInt(sum.high) + BigInt(sum.low)).toBe(BigInt(a) + BigInt(b));
        expect(BigInt(product.high) + BigInt(product.low)).toBe(BigInt(a) * BigInt(b));
      }),
    );
  });
});

describe('add, multiply and divide', () => {
  it('keep thirty digits of a sum of squares', () => {
    fc.assert(
      fc.property(short, short, short, (a, b, c) => {
        const squares = add(
          multiply(toDoubleDouble(a), toDoubleDouble(a)),
          multiply(toDoubleDouble(b), toDoubleDouble(b)),
        );
        const { high, low } = add(squares, toDoubleDouble(c));
        expect(BigInt(high) + BigInt(low)).toBe(BigInt(a) ** 2n + BigInt(b) ** 2n + BigInt(c));
      }),
    );
  });

  // 1/3 in binary repeats 01, so three times it misses 1 only below the last of 106 bits.
  it('divides to the last bits', () => {
    const third = divide(toDoubleDouble(1), toDoubleDouble(3));
    const back = add(multiply(third, toDoubleDouble(3)), toDoubleDouble(-1));
    expect(Math.abs(back.high)).toBeLessThan(2 ** -104);
    expect(third.high).toBe(1 / 3);
  });
});
