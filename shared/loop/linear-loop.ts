/** Loop-normalised gains: g1 = Kd·K0·Kp, g2 = Kd·K0·Ki, g3 = Kd·K0·Kii; 0 where the order has none. */
export interface LoopGains {
  g1: number;
  g2: number;
  g3: number;
}

/**
 * The linear loop of one stage, sampled once per update:
 *
 *     L(z) = z^−(1+D) / (1 − z⁻¹) · A(z) · Σ g_m / (1 − z⁻¹)^(m−1)
 *
 * In w = z − 1 its closed-loop polynomial is z^E·w^n + M(w), with n the order, and never has to be expanded into
 * powers of z, where it would cancel: for BnT 1e−5 its coefficients agree in ten digits.
 */
export interface LinearLoop {
  gains: LoopGains;
  /** Number of integrators, the oscillator's included; 0 for a loop without gain. */
  order: number;
  /** Extra pipeline delay D, updates. */
  delay: number;
  /** Symbols whose errors are averaged into one update; 1 where nothing is averaged. */
  averaged: number;
}

/** A loop from its gains; the order is that of the last gain above 0. */
export function linearLoop({ gains, delay, averaged }: Omit<LinearLoop, 'order'>): LinearLoop {
  const order = gains.g3 > 0 ? 3 : gains.g2 > 0 ? 2 : gains.g1 > 0 ? 1 : 0;
  return { gains, order, delay, averaged };
}

/** The same loop with every gain multiplied by a ratio. */
export function scaledLoop(loop: LinearLoop, ratio: number): LinearLoop {
  const { g1, g2, g3 } = loop.gains;
  return { ...loop, gains: { g1: ratio * g1, g2: ratio * g2, g3: ratio * g3 } };
}

/** a of A(z) = a + (1 − a)·z⁻¹, the average of U errors while the oscillator turns every symbol; 1 for U ≤ 1. */
export const averagingWeight = (averaged: number): number => (averaged + 1) / (2 * averaged);

/** E of the closed-loop polynomial z^E·w^n + M(w): the delay, and one more where errors are averaged. */
export const delayExponent = (loop: LinearLoop): number => loop.delay + (loop.averaged > 1 ? 1 : 0);

/** Coefficients of M(w), constant first: Σ g_m·w^(n−m)·z^(m−1), times 1 + a·w where errors are averaged. */
export function forwardPolynomial(loop: LinearLoop): number[] {
  const plain = plainForward(loop);
  if (loop.averaged <= 1) return plain;
  const a = averagingWeight(loop.averaged);
  return [...plain, 0].map((coefficient, k) => coefficient + a * (plain[k - 1] ?? 0));
}

function plainForward({ gains: { g1, g2, g3 }, order }: LinearLoop): number[] {
  if (order === 3) return [g3, g2 + 2 * g3, g1 + g2 + g3];
  if (order === 2) return [g2, g1 + g2];
  return [g1];
}
