import { evaluatePolynomial, squaredModulus, subtract } from '../math/complex';
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

/**
 * Poles of a loop next to those of another one like it, in the same order: the same iteration from those, of these
 * poles alone. A real pair that parts, or a complex one that meets, is given a nudge, which no symmetry would give.
 *
 * @param near poles in z of a loop whose gain is a little different
 */
export function polesNear(loop: LinearLoop, near: readonly (readonly [number, number])[]): [number, number][] {
  const roots = {
    re: Float64Array.from(near, ([re]) => re - 1),
    im: Float64Array.from(near, ([re, im], i) => im + (i % 2 ? -nudge : nudge) * Math.hypot(re - 1, im)),
  };
  const forward = forwardPolynomial(loop);
  for (let round = 0; round < 40; round += 1) if (improve(loop, forward, roots, followedShare)) break;
  return near.map((_, i): [number, number] => {
    const im = roots.im[i] as number;
    return [1 + (roots.re[i] as number), Math.abs(im) < 1e-12 ? 0 : im];
  });
}

const nudge = 1e-4;
/** A drawing needs no more; the iteration, of third order, is by then far better. */
const followedShare = 1e-6;

/** Real and imaginary parts of the roots, in two arrays: the inner sum runs over all pairs. */
interface Roots {
  re: Float64Array;
  im: Float64Array;
}

/** One round of the iteration, in place; true once nothing moves by more than a share of its root. */
function improve(loop: LinearLoop, forward: readonly number[], { re, im }: Roots, share = 1e-15): boolean {
  let settled = true;
  const [exponent, order] = [delayExponent(loop), loop.order];
  for (let i = 0; i < re.length; i += 1) {
    const [wRe, wIm] = [re[i] as number, im[i] as number];
    newtonRatio(forward, exponent, order, wRe, wIm);
    const [ratioRe, ratioIm] = [scratch[0] as number, scratch[1] as number];
    if (ratioRe === 0 && ratioIm === 0) continue;
    crowding(re, im, i);
    const [crowdRe, crowdIm] = [scratch[0] as number, scratch[1] as number];
    const belowRe = 1 - (ratioRe * crowdRe - ratioIm * crowdIm);
    const belowIm = -(ratioRe * crowdIm + ratioIm * crowdRe);
    const below = belowRe * belowRe + belowIm * belowIm;
    const stepRe = (ratioRe * belowRe + ratioIm * belowIm) / below;
    const stepIm = (ratioIm * belowRe - ratioRe * belowIm) / below;
    if (!Number.isFinite(stepRe) || !Number.isFinite(stepIm)) continue;
    re[i] = wRe - stepRe;
    im[i] = wIm - stepIm;
    if (stepRe * stepRe + stepIm * stepIm > share * share * (wRe * wRe + wIm * wIm)) settled = false;
  }
  return settled;
}

/** A complex number on its way out of the innermost functions: an object for each would cost more than the arithmetic. */
const scratch = new Float64Array(2);

/** Σ 1/(root − other) over the other roots; a root that falls on this one pushes nowhere. */
function crowding(re: Float64Array, im: Float64Array, i: number): void {
  let [sumRe, sumIm] = [0, 0];
  const [ownRe, ownIm] = [re[i] as number, im[i] as number];
  for (let j = 0; j < re.length; j += 1) {
    const dRe = ownRe - (re[j] as number);
    const dIm = ownIm - (im[j] as number);
    const scale = dRe * dRe + dIm * dIm;
    if (scale === 0) continue;
    sumRe += dRe / scale;
    sumIm -= dIm / scale;
  }
  scratch[0] = sumRe;
  scratch[1] = sumIm;
}

/** P/P′ of P = z^E·w^n + M(w), with P′ = z^(E−1)·w^(n−1)·(E·w + n·z) + M′; 0 exactly on a root. */
function newtonRatio(forward: readonly number[], exponent: number, order: number, wRe: number, wIm: number): void {
  const zRe = 1 + wRe;
  let [commonRe, commonIm] = [1, 0];
  let [squareRe, squareIm] = [zRe, wIm];
  for (let rest = Math.max(exponent - 1, 0); rest > 0; rest >>= 1) {
    if (rest & 1) {
      const next = commonRe * squareRe - commonIm * squareIm;
      commonIm = commonRe * squareIm + commonIm * squareRe;
      commonRe = next;
    }
    const next = squareRe * squareRe - squareIm * squareIm;
    squareIm = 2 * squareRe * squareIm;
    squareRe = next;
  }
  for (let k = 1; k < order; k += 1) {
    const next = commonRe * wRe - commonIm * wIm;
    commonIm = commonRe * wIm + commonIm * wRe;
    commonRe = next;
  }
  let [valueRe, valueIm, slopeRe, slopeIm] = [0, 0, 0, 0];
  for (let k = forward.length - 1; k >= 0; k -= 1) {
    const nextSlope = slopeRe * wRe - slopeIm * wIm + valueRe;
    slopeIm = slopeRe * wIm + slopeIm * wRe + valueIm;
    slopeRe = nextSlope;
    const nextValue = valueRe * wRe - valueIm * wIm + (forward[k] as number);
    valueIm = valueRe * wIm + valueIm * wRe;
    valueRe = nextValue;
  }
  // What common is multiplied with: z·w and E·w + n·z where there is a delay, w and n where there is none.
  const [withRe, withIm] = exponent > 0 ? [zRe * wRe - wIm * wIm, zRe * wIm + wIm * wRe] : [wRe, wIm];
  const [innerRe, innerIm] = exponent > 0 ? [exponent * wRe + order * zRe, (exponent + order) * wIm] : [order, 0];
  valueRe += commonRe * withRe - commonIm * withIm;
  valueIm += commonRe * withIm + commonIm * withRe;
  slopeRe += commonRe * innerRe - commonIm * innerIm;
  slopeIm += commonRe * innerIm + commonIm * innerRe;
  const scale = slopeRe * slopeRe + slopeIm * slopeIm;
  scratch[0] = (valueRe * slopeRe + valueIm * slopeIm) / scale;
  scratch[1] = (valueIm * slopeRe - valueRe * slopeIm) / scale;
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

/** Imaginary part over the distance from z = 1 that rounding alone leaves of a double real root: √ε. */
const realShare = 3e-8;

/**
 * Largest modulus first; a part that is rounding alone becomes 0, and pairs become exact conjugates: a root in the upper
 * half-plane without a partner below is half of a double real root.
 */
function ordered(roots: Complex[]): [number, number][] {
  const left = roots.map(([re, im]): Complex => [re, Math.abs(im) < realPart(re, im) ? 0 : im]);
  const upper = left.filter(([, im]) => im > 0).sort((a, b) => b[1] - a[1]);
  const pairs = upper.slice(0, left.filter(([, im]) => im < 0).length);
  const real = left.length - 2 * pairs.length;
  const alone = left.filter((root) => !pairs.includes(root)).sort((a, b) => Math.abs(a[1]) - Math.abs(b[1]));
  const groups = [
    ...alone.slice(0, real).map(([re]): [number, number][] => [[re, 0]]),
    ...pairs.map(([re, im]): [number, number][] => [
      [re, im],
      [re, -im],
    ]),
  ];
  const modulus = (group: [number, number][]): number => squaredModulus(group[0] as [number, number]);
  return groups.sort((a, b) => modulus(b) - modulus(a)).flat();
}

const realPart = (re: number, im: number): number => Math.max(1e-12, realShare * Math.hypot(re - 1, im));
