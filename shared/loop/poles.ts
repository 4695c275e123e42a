import { add, divide, evaluatePolynomial, multiply, power, squaredModulus, subtract } from '../math/complex';
import type { Complex } from '../math/complex';
import { delayExponent, forwardPolynomial } from './linear-loop';
import type { LinearLoop } from './linear-loop';

/**
 * Every closed-loop pole in z, delay included: E + n of them, largest modulus first, conjugate pairs together with
 * the upper one first. Found over w = z − 1 by the simultaneous iteration of Aberth and Ehrlich, so that slow poles
 * keep their distance from 1.
 *
 * @see O. Aberth, "Iteration methods for finding all zeros of a polynomial simultaneously", 1973
 */
export function closedLoopPoles(loop: LinearLoop): [number, number][] {
  if (loop.order === 0) return [];
  const start = startingPoints(loop);
  const roots = { re: Float64Array.from(start, ([re]) => re), im: Float64Array.from(start, ([, im]) => im) };
  const forward = forwardPolynomial(loop);
  for (let round = 0; round < 80; round += 1) if (improve(loop, forward, roots)) break;
  return ordered(start.map((_, i): Complex => [1 + (roots.re[i] as number), roots.im[i] as number]));
}

/** Real and imaginary parts of the roots, in two arrays: the inner sum runs over all pairs. */
interface Roots {
  re: Float64Array;
  im: Float64Array;
}

/** One round of the iteration, in place; true once nothing moves any more. */
function improve(loop: LinearLoop, forward: readonly number[], roots: Roots): boolean {
  let settled = true;
  for (let i = 0; i < roots.re.length; i += 1) {
    const root: Complex = [roots.re[i] as number, roots.im[i] as number];
    const ratio = newtonRatio(loop, forward, root);
    if (!ratio) continue;
    const step = divide(ratio, subtract([1, 0], multiply(ratio, crowding(roots, i))));
    if (!Number.isFinite(step[0]) || !Number.isFinite(step[1])) continue;
    roots.re[i] = root[0] - step[0];
    roots.im[i] = root[1] - step[1];
    if (squaredModulus(step) > 1e-30 * squaredModulus(root)) settled = false;
  }
  return settled;
}

/** Σ 1/(root − other) over the other roots; a root that falls on this one pushes nowhere. */
function crowding({ re, im }: Roots, i: number): Complex {
  let [sumRe, sumIm] = [0, 0];
  for (let j = 0; j < re.length; j += 1) {
    const dRe = (re[i] as number) - (re[j] as number);
    const dIm = (im[i] as number) - (im[j] as number);
    const scale = dRe * dRe + dIm * dIm;
    if (scale === 0) continue;
    sumRe += dRe / scale;
    sumIm -= dIm / scale;
  }
  return [sumRe, sumIm];
}

/** P/P′ of P(w) = z^E·w^n + M(w); null exactly on a root. */
function newtonRatio(loop: LinearLoop, coefficients: readonly number[], w: Complex): Complex | null {
  const exponent = delayExponent(loop);
  const z: Complex = [1 + w[0], w[1]];
  const forward = evaluatePolynomial(coefficients, w);
  const integrated = power(w, loop.order - 1);
  const delayed: Complex = exponent > 0 ? power(z, exponent - 1) : [1, 0];
  const common = multiply(delayed, integrated);
  const value = add(multiply(common, exponent > 0 ? multiply(z, w) : w), forward.value);
  const inner: Complex =
    exponent > 0 ? [exponent * w[0] + loop.order * z[0], exponent * w[1] + loop.order * z[1]] : [loop.order, 0];
  const slope = add(multiply(common, inner), forward.slope);
  return squaredModulus(value) === 0 ? null : divide(value, slope);
}

/** Slow poles on a circle left of w = 0, the delay's on a circle round z = 0, neither symmetric to the real axis. */
function startingPoints(loop: LinearLoop): Complex[] {
  const exponent = delayExponent(loop);
  const forward = forwardPolynomial(loop);
  const slow = Math.min(Math.abs(forward[0] as number) ** (1 / loop.order), 0.9);
  const atZero = Math.abs(evaluatePolynomial(forward, [-1, 0]).value[0]);
  const fast = exponent > 0 ? Math.max(atZero, 1e-6) ** (1 / exponent) : 0;
  const slowRoots = Array.from({ length: loop.order }, (_, k) =>
    onCircle(slow, Math.PI / 2 + (Math.PI * (k + 0.45)) / loop.order),
  );
  const fastRoots = Array.from({ length: exponent }, (_, k) => onCircle(fast, (2 * Math.PI * (k + 0.53)) / exponent));
  return [...slowRoots, ...fastRoots.map((root) => subtract(root, [1, 0]))];
}

const onCircle = (radius: number, angle: number): Complex => [radius * Math.cos(angle), radius * Math.sin(angle)];

/** Largest modulus first; a part that is rounding alone becomes 0, and pairs become exact conjugates. */
function ordered(roots: Complex[]): [number, number][] {
  const left = roots.map(([re, im]): Complex => [re, Math.abs(im) < 1e-12 ? 0 : im]);
  const real = left.filter(([, im]) => im === 0).map(([re]): [number, number][] => [[re, 0]]);
  const upper = left
    .filter(([, im]) => im > 0)
    .map(([re, im]): [number, number][] => [
      [re, im],
      [re, -im],
    ]);
  const modulus = (group: [number, number][]): number => squaredModulus(group[0] as [number, number]);
  return [...real, ...upper].sort((a, b) => modulus(b) - modulus(a)).flat();
}
