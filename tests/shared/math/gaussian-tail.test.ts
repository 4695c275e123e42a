import { describe, expect, it } from 'vitest';
import { edgeTail, owensT, tail } from '../../../shared/math/gaussian-tail';
import { gaussLegendre } from '../../../shared/math/gauss-legendre';
import { sineSeries } from '../../../shared/math/sine-series';

describe('owensT', () => {
  // Derived: scipy 1.17, scipy.special.owens_t.
  it.each([
    [0.1, 0.5, 0.07339499712685259],
    [1, 1, 0.06674188216570097],
    [0.5, 3, 0.15108404307601844],
    [2, 0.2, 0.004142193045622089],
    [3, 10, 0.0006749490158150479],
    [0.01, 50, 0.24642753439434217],
    [6, 1.5, 4.932938225188509e-10],
  ])('T(%f, %f) is %f', (h, a, value) => {
    expect(owensT(h, a) / value).toBeCloseTo(1, 10);
  });

  // D. B. Owen 1956: T(h, ∞) = Q(h)/2, T(0, a) = arctan a/2π, T(h, 1) = Q(h)(1 − Q(h))/2.
  it('has its published special values', () => {
    expect(owensT(1.3, Infinity)).toBeCloseTo(tail(1.3) / 2, 14);
    expect(owensT(0, 0.7)).toBeCloseTo(Math.atan(0.7) / (2 * Math.PI), 12);
    expect(owensT(0.8, 1)).toBeCloseTo((tail(0.8) * (1 - tail(0.8))) / 2, 14);
  });
});

describe('edgeTail', () => {
  // Derived: differences of scipy.special.owens_t, scipy 1.17.
  it.each([
    [0.3, -4, 5, 0.37478198548102126],
    [0.5, -1.4, 1, 0.23277180152100252],
    [1, 2, 5, 0.0008594374788060688],
    [2, -3, -0.5, 0.002749987986023536],
    [0.01, -2, 1, 0.30118431912692994],
    [3, -0.4, 0.6, 0.0011859562836738094],
  ])('over the edge at %f from %f to %f is %f', (h, from, to, value) => {
    expect(Math.abs(edgeTail(h, from, to) - value)).toBeLessThan(1e-9);
  });
});

describe('gaussLegendre', () => {
  // Exact for polynomials up to degree 2n − 1: ∫ x⁸ over [−1, 1] is 2/9 with five nodes, not with four.
  it('integrates what it must and no more', () => {
    const integral = (count: number) => {
      const { nodes, weights } = gaussLegendre(count);
      return nodes.reduce((sum, x, i) => sum + weights[i]! * x ** 8, 0);
    };
    expect(integral(5)).toBeCloseTo(2 / 9, 14);
    expect(Math.abs(integral(4) - 2 / 9)).toBeGreaterThan(1e-3);
  });
});

describe('sineSeries', () => {
  it('is a sum of few sines itself', () => {
    const odd = (x: number) => Math.sin(3 * x) - 0.4 * Math.sin(12 * x);
    const series = sineSeries(odd, (2 * Math.PI) / 3, 5);
    for (const x of [-1.1, 0.05, 0.7, 4]) expect(series(x)).toBeCloseTo(odd(x), 12);
  });
});
