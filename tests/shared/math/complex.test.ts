import fc from 'fast-check';
import { complex, divide as quotient, multiply as product, pow } from 'mathjs';
import type { Complex as MathComplex } from 'mathjs';
import { describe, expect, it } from 'vitest';
import { divide, evaluatePolynomial, multiply, power } from '../../../shared/math/complex';
import type { Complex } from '../../../shared/math/complex';

const part = fc.double({ min: -3, max: 3, noNaN: true }).filter((value) => value === 0 || Math.abs(value) > 1e-6);
const number = fc.tuple(part, part);
const near = ([re, im]: Complex, expected: MathComplex): void => {
  const scale = 1 + Math.hypot(expected.re, expected.im);
  expect(Math.abs(re - expected.re) / scale).toBeLessThan(1e-12);
  expect(Math.abs(im - expected.im) / scale).toBeLessThan(1e-12);
};

describe('complex arithmetic', () => {
  // mathjs
  it('multiplies, divides and raises like mathjs', () => {
    fc.assert(
      fc.property(number, number, fc.integer({ min: 0, max: 64 }), (a, b, n) => {
        near(multiply(a, b), product(complex(...a), complex(...b)) as MathComplex);
        if (Math.hypot(...b) > 1e-3) near(divide(a, b), quotient(complex(...a), complex(...b)) as MathComplex);
        if (Math.hypot(...a) > 1e-3 && Math.hypot(...a) < 1.2)
          near(power(a, n), complex(pow(complex(...a), n) as MathComplex));
      }),
    );
  });

  // By hand: p = 1 + 2x + 3x² at x = j is 1 + 2j − 3, its slope 2 + 6j.
  it('evaluates a polynomial and its slope', () => {
    expect(evaluatePolynomial([1, 2, 3], [0, 1])).toEqual({ value: [-2, 2], slope: [2, 6] });
  });
});
