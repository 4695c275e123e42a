import { complex, divide, polynomialRoot } from 'mathjs';
import type { Complex } from 'mathjs';
import { describe, expect, it } from 'vitest';
import { dominantDamping } from '../../../shared/loop/dominant-pair';
import { secondOrderGains } from '../../../shared/loop/gains';
import { linearLoop } from '../../../shared/loop/linear-loop';

const loopOf = (damping: number, theta: number, delay: number, averaged = 1) =>
  linearLoop({ gains: secondOrderGains({ damping, theta }), delay, averaged });

describe('dominantDamping', () => {
  it.each([0.05, 0.5, 1, 3])('is ζ = %f of the formula when there is no delay', (damping) => {
    const pair = dominantDamping(loopOf(damping, 0.01, 0))!;
    expect(pair.damping).toBeCloseTo(damping, 12);
    expect(pair.theta).toBeCloseTo(0.01, 14);
  });

  // mathjs solves z³ − 2z² + (1 + g1 + g2)z − g1 = 0; the pair near 1 through s = 2(z − 1)/(z + 1).
  it('matches the roots of the cubic at D = 1', () => {
    const loop = loopOf(Math.SQRT1_2, 0.05, 1);
    const { g1, g2 } = loop.gains;
    const cubic = polynomialRoot(-g1, 1 + g1 + g2, -2, 1);
    const upper = cubic.map((root) => complex(root as Complex)).find(({ im }) => im > 1e-6)!;
    const s = divide(complex(2 * (upper.re - 1), 2 * upper.im), complex(upper.re + 1, upper.im)) as Complex;
    const pair = dominantDamping(loop)!;
    expect(pair.damping).toBeCloseTo(-s.re / Math.hypot(s.re, s.im), 10);
    expect(2 * pair.theta).toBeCloseTo(Math.hypot(s.re, s.im), 10);
  });

  it('has none for other orders, and none where the pair has met another pole', () => {
    expect(dominantDamping(linearLoop({ gains: { g1: 0.1, g2: 0, g3: 0 }, delay: 3, averaged: 1 }))).toBeNull();
    expect(dominantDamping(linearLoop({ gains: { g1: 0.1, g2: 1e-5, g3: 0 }, delay: 6, averaged: 1 }))).toBeNull();
  });
});
