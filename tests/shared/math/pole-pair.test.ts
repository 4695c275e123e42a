import { describe, expect, it } from 'vitest';
import { dampingOf, multiplyModulo, pairOf, powerModulo, reciprocalModulo } from '../../../shared/math/pole-pair';

describe('arithmetic modulo a pole pair', () => {
  // By hand, modulo w² + w + 2: w² = −w − 2, so (1 + w)² = w − 1 and (1 + w)³ = w² − 1 = −w − 3.
  it('reduces powers of 1 + w', () => {
    const pair = { alpha: 1, beta: 2 };
    expect(powerModulo(0, pair)).toEqual({ u: 0, v: 1 });
    expect(powerModulo(2, pair)).toEqual({ u: 1, v: -1 });
    expect(powerModulo(3, pair)).toEqual({ u: -1, v: -3 });
  });

  it('inverts 1 + a·w', () => {
    const pair = { alpha: 0.3, beta: 0.05 };
    const one = multiplyModulo(reciprocalModulo(0.6, pair), { u: 0.6, v: 1 }, pair);
    expect(one.u).toBeCloseTo(0, 14);
    expect(one.v).toBeCloseTo(1, 14);
  });
});

describe('dampingOf', () => {
  it.each([
    [0.05, 1e-5],
    [Math.SQRT1_2, 0.01],
    [1, 0.2],
    [10, 0.001],
  ])('undoes pairOf at ζ = %f, θ = %f', (damping, theta) => {
    const back = dampingOf(pairOf({ damping, theta }))!;
    expect(Math.abs(back.damping / damping - 1)).toBeLessThan(1e-9);
    expect(Math.abs(back.theta / theta - 1)).toBeLessThan(1e-12);
  });

  it('has none for a pair that no analog pair maps to', () => {
    expect(dampingOf({ alpha: 0.1, beta: -0.01 })).toBeNull();
    expect(dampingOf({ alpha: 5, beta: 5 })).toBeNull();
  });
});
