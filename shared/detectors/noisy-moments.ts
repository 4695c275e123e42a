import type { Point } from '../fixed-point/constellation';

/**
 * Re E[z^p · conj(z)^q] of z = a + n for complex Gaussian noise of E|n|² = 1/γ:
 *
 *     Σ_k C(p,k) C(q,k) k! γ^(−k) · Re E[a^(p−k) · conj(a)^(q−k)],   k = 0 … min(p, q)
 *
 * The imaginary part is nought for every point list that is its own mirror image.
 *
 * @param points E|a|² = 1
 * @param esN0 γ as a ratio
 * @param p power of z, a whole number of 0 or more; q that of conj(z)
 */
export function noisyMoment(points: readonly Point[], esN0: number, p: number, q: number): number {
  let [sum, weight] = [0, 1];
  for (let k = 0; k <= Math.min(p, q); k += 1) {
    sum += weight * pointMoment(points, p - k, q - k);
    weight *= ((p - k) * (q - k)) / ((k + 1) * esN0);
  }
  return sum;
}

/** Re E[a^p · conj(a)^q] over the points. */
function pointMoment(points: readonly Point[], p: number, q: number): number {
  const value = ([i, q0]: Point): number => Math.hypot(i, q0) ** (p + q) * Math.cos((p - q) * Math.atan2(q0, i));
  return points.reduce((sum, point) => sum + value(point), 0) / points.length;
}
