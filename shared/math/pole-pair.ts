/**
 * Two poles as the monic quadratic w² + α·w + β over w = z − 1: a pair keeps its precision as sum and product where
 * the poles themselves, being close or equal, would not.
 */
export interface PolePair {
  alpha: number;
  beta: number;
}

/** The line u·w + v: what is left of a polynomial modulo a pole pair. */
export interface Remainder {
  u: number;
  v: number;
}

/** (u·w + v)·(p·w + q) modulo the pair. */
export function multiplyModulo(a: Remainder, b: Remainder, { alpha, beta }: PolePair): Remainder {
  const square = a.u * b.u;
  return { u: a.u * b.v + a.v * b.u - square * alpha, v: a.v * b.v - square * beta };
}

/** (1 + w)^exponent modulo the pair, exponent whole and not negative. */
export function powerModulo(exponent: number, pair: PolePair): Remainder {
  let power: Remainder = { u: 0, v: 1 };
  for (let k = 0; k < exponent; k += 1) power = multiplyModulo(power, { u: 1, v: 1 }, pair);
  return power;
}

/** 1/(1 + a·w) modulo the pair. */
export function reciprocalModulo(a: number, { alpha, beta }: PolePair): Remainder {
  const norm = 1 - a * alpha + a * a * beta;
  return { u: -a / norm, v: (1 - a * alpha) / norm };
}

/** The bilinear image of s² + 2ζωn·s + ωn², θ = ωnTu/2. */
export function pairOf({ damping, theta }: { damping: number; theta: number }): PolePair {
  const scale = 1 + 2 * damping * theta + theta ** 2;
  return { alpha: (4 * damping * theta + 4 * theta ** 2) / scale, beta: (4 * theta ** 2) / scale };
}

/** Damping factor and θ of the analog pair whose bilinear image this is; null where it is no such image. */
export function dampingOf({ alpha, beta }: PolePair): { damping: number; theta: number } | null {
  const scale = 4 - 2 * alpha + beta;
  if (!(beta > 0 && scale > 0)) return null;
  return { damping: (alpha - beta) / Math.sqrt(beta * scale), theta: Math.sqrt(beta / scale) };
}
