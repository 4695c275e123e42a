import erfc from '@stdlib/math-base-special-erfc';
import { gaussLegendre } from './gauss-legendre';

const [fine, coarse] = [gaussLegendre(16), gaussLegendre(8)];
/** Deviations beyond which the Gaussian under an integral is left out: 3e-12 of what stands before. */
const reach = 7;
const halfRoot = Math.SQRT1_2;
const perTurn = 1 / (2 * Math.PI);

/** Q(x): probability that a normal variable exceeds x. */
export const tail = (x: number): number => 0.5 * erfc(x * halfRoot);

/** Density of a normal variable of mean 0 and deviation 1. */
export const normalDensity = (x: number): number => Math.exp(-0.5 * x * x) / Math.sqrt(2 * Math.PI);

/**
 * T(h, a) = 1/(2π) ∫₀ᵃ exp(−h²(1 + x²)/2)/(1 + x²) dx for h ≥ 0 and a ≥ 0, infinity included: the probability that a
 * pair of independent normal variables falls into X > h, 0 < Y < aX. Good to 1e-10.
 *
 * @see D. B. Owen, "Tables for computing bivariate normal probabilities", Ann. Math. Statist. 27, 1956
 */
export function owensT(h: number, a: number): number {
  if (a <= 1) return tailBetween(h, 0, a);
  const near = tail(h);
  if (a === Infinity || a * h > 38) return near / 2;
  const far = tail(a * h);
  return (near + far) / 2 - near * far - tailBetween(a * h, 0, 1 / a);
}

/** 1/(2π) ∫ exp(−h²(1 + x²)/2)/(1 + x²) dx by quadrature, between bounds that are near against the poles at ±j. */
function tailBetween(h: number, from: number, to: number): number {
  const end = from >= 0 && h * to > reach ? Math.min(to, Math.sqrt(from * from + (reach / h) ** 2)) : to;
  const half = (end - from) / 2;
  const { nodes, weights } = half * half < 0.12 * poleSquare(from, to) && h * half < 1 ? coarse : fine;
  const middle = from + half;
  const square = -0.5 * h * h;
  let sum = 0;
  for (let i = 0; i < nodes.length; i += 1) {
    const x = middle + half * nodes[i]!;
    const secant = 1 + x * x;
    sum += (weights[i]! * Math.exp(square * secant)) / secant;
  }
  return perTurn * half * sum;
}

/** Square of the distance from a range of x to ±j. */
const poleSquare = (from: number, to: number): number => 1 + (from > 0 ? from * from : to < 0 ? to * to : 0);

/**
 * The same integral over x from `from` to `to`, either of them of any sign or infinite: the share of the circle that a
 * straight edge at distance h hides, weighted by the Gaussian beyond it.
 */
export function edgeTail(h: number, from: number, to: number): number {
  if (from < 0 && to <= 0) return edgeTail(h, -to, -from);
  const half = (to - from) / 2;
  if (half * half <= 2.25 * poleSquare(from, to) && h * half <= 3) return tailBetween(h, from, to);
  return from < 0 ? owensT(h, -from) + owensT(h, to) : owensT(h, to) - owensT(h, from);
}
