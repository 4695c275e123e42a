import { add, complex, divide, multiply, polynomialRoot, pow, subtract } from 'mathjs';
import type { Complex } from 'mathjs';
import { describe, expect, it } from 'vitest';
import { nominalGains, secondOrderGains } from '../../../shared/loop/gains';
import { linearLoop } from '../../../shared/loop/linear-loop';
import { noiseBandwidth } from '../../../shared/loop/noise-bandwidth';
import { closedLoopPoles } from '../../../shared/loop/poles';

const loopOf = (theta: number, delay: number, averaged = 1) =>
  linearLoop({ gains: secondOrderGains({ damping: Math.SQRT1_2, theta }), delay, averaged });

/** The closed-loop polynomial of order 2 in mathjs, straight from its definition: z^D·(z − 1)² + (g1 + g2)·z − g1. */
const residual = ({ gains: { g1, g2 }, delay }: ReturnType<typeof loopOf>, [re, im]: [number, number]): number => {
  const z = complex(re, im);
  const delayed = pow(z, delay) as Complex;
  const integrators = pow(complex(re - 1, im), 2) as Complex;
  const square = multiply(delayed, integrators);
  const sum = add(square, multiply(g1 + g2, z) as Complex, complex(-g1, 0)) as Complex;
  return Math.hypot(sum.re, sum.im);
};

describe('closedLoopPoles', () => {
  // By hand: ζ = 1 without delay is the double pole (1 − θ)/(1 + θ), twice and no more.
  it.each([0.008, 0.001, 0.05])('finds a double pole twice at θ = %f', (theta) => {
    const loop = linearLoop({ gains: secondOrderGains({ damping: 1, theta }), delay: 0, averaged: 1 });
    const poles = closedLoopPoles(loop);
    expect(poles).toHaveLength(2);
    for (const [re, im] of poles) {
      expect(re).toBeCloseTo((1 - theta) / (1 + theta), 8);
      expect(im).toBe(0);
    }
  });

  it('matches mathjs on the cubic of D = 1', () => {
    const loop = loopOf(0.05, 1);
    const { g1, g2 } = loop.gains;
    const roots = polynomialRoot(-g1, 1 + g1 + g2, -2, 1).map((root) => complex(root as Complex));
    for (const [re, im] of closedLoopPoles(loop)) {
      expect(Math.min(...roots.map((root) => Math.hypot(root.re - re, root.im - im)))).toBeLessThan(1e-10);
    }
  });

  it.each([0, 1, 2, 3, 10, 33, 64])('finds all of them with D = %i', (delay) => {
    const loop = loopOf(0.004, delay);
    const poles = closedLoopPoles(loop);
    expect(poles).toHaveLength(delay + 2);
    for (const pole of poles) expect(residual(loop, pole)).toBeLessThan(1e-12);
    for (const [re, im] of poles) if (im !== 0) expect(poles).toContainEqual([re, -im]);
    const product = poles.reduce((sofar, [re, im]) => multiply(sofar, complex(re, im)) as Complex, complex(1, 0));
    // Vieta: all poles multiply to ± the constant coefficient.
    const constant = delay === 0 ? 1 - loop.gains.g1 : loop.gains.g1;
    expect(Math.abs(Math.hypot(product.re, product.im) / constant - 1)).toBeLessThan(1e-9);
  });

  it('keeps the distance of slow poles from 1', () => {
    const [pole] = closedLoopPoles(loopOf(1e-5, 0)) as [[number, number]];
    // Bilinear image of s·Tu/2 = θ(−1 + j)/√2: z − 1 = 2σ/(1 − σ).
    const sigma = complex(-1e-5 * Math.SQRT1_2, 1e-5 * Math.SQRT1_2);
    const w = divide(multiply(2, sigma), subtract(1, sigma)) as Complex;
    expect(pole[0] - 1).toBeCloseTo(w.re, 15);
    expect(pole[1]).toBeCloseTo(w.im, 15);
  });

  it.each([1, 3])('gives the poles of order %i, the averaging one included', (order) => {
    const gains = nominalGains(order, { damping: 1, theta: 0.02 });
    expect(closedLoopPoles(linearLoop({ gains, delay: 2, averaged: 1 }))).toHaveLength(order + 2);
    expect(closedLoopPoles(linearLoop({ gains, delay: 2, averaged: 8 }))).toHaveLength(order + 3);
  });

  it('leaves the unit circle when the noise bandwidth ends', () => {
    for (const delay of [30, 36, 37, 38, 39, 40, 50]) {
      const loop = loopOf(0.01 / (1.5 * Math.SQRT1_2), delay);
      const largest = Math.hypot(...closedLoopPoles(loop)[0]!);
      expect(largest < 1).toBe(noiseBandwidth(loop) !== null);
    }
  });
});
