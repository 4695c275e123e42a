import { evaluatePolynomial, squaredModulus } from '../math/complex';
import type { Complex } from '../math/complex';
import { delayExponent, forwardPolynomial } from './linear-loop';
import type { LinearLoop } from './linear-loop';

/** Points of the unit circle at which loops of one order, delay and averaging are evaluated. */
export interface CirclePoints {
  /** Radians per update. */
  omega: Float64Array;
  /** w = e^jω − 1, without cancellation near ω = 0. */
  wRe: Float64Array;
  wIm: Float64Array;
  /** z^E·w^n. */
  openRe: Float64Array;
  openIm: Float64Array;
}

/** |H|² and |E|² of the closed loop at some points. */
export interface ResponsePowers {
  h: Float64Array;
  e: Float64Array;
}

/** @param omega radians per update, above 0 and at most π */
export function circlePoints(loop: LinearLoop, omega: Float64Array): CirclePoints {
  const exponent = delayExponent(loop);
  const wRe = omega.map((value) => -2 * Math.sin(value / 2) ** 2);
  const wIm = omega.map((value) => Math.sin(value));
  // w = 2·sin(ω/2)·e^j(π + ω)/2, so the modulus and the angle of z^E·w^n are known without multiplying.
  const modulus = omega.map((value) => (2 * Math.sin(value / 2)) ** loop.order);
  const angle = omega.map((value) => exponent * value + (loop.order * (Math.PI + value)) / 2);
  const openRe = angle.map((value, i) => (modulus[i] as number) * Math.cos(value));
  const openIm = angle.map((value, i) => (modulus[i] as number) * Math.sin(value));
  return { omega, wRe, wIm, openRe, openIm };
}

/** |H|² = |M|²/|z^E·w^n + M|² and |E|² = |z^E·w^n|²/|z^E·w^n + M|². */
export function responsePowers(loop: LinearLoop, points: CirclePoints): ResponsePowers {
  const coefficients = forwardPolynomial(loop);
  const h = new Float64Array(points.omega.length);
  const e = new Float64Array(points.omega.length);
  for (let i = 0; i < h.length; i += 1) {
    const [re, im] = [points.wRe[i] as number, points.wIm[i] as number];
    const [openRe, openIm] = [points.openRe[i] as number, points.openIm[i] as number];
    let [forwardRe, forwardIm] = [0, 0];
    for (let k = coefficients.length - 1; k >= 0; k -= 1) {
      const next = forwardRe * re - forwardIm * im + (coefficients[k] as number);
      forwardIm = forwardRe * im + forwardIm * re;
      forwardRe = next;
    }
    const below = (openRe + forwardRe) ** 2 + (openIm + forwardIm) ** 2;
    h[i] = (forwardRe ** 2 + forwardIm ** 2) / below;
    e[i] = (openRe ** 2 + openIm ** 2) / below;
  }
  return { h, e };
}

/** |H|² at one frequency, radians per update. */
export function closedLoopPower(loop: LinearLoop, omega: number): number {
  const chord = 2 * Math.sin(omega / 2);
  const open = chord ** loop.order;
  const angle = delayExponent(loop) * omega + (loop.order * (Math.PI + omega)) / 2;
  const forward = evaluatePolynomial(forwardPolynomial(loop), [(-chord * chord) / 2, Math.sin(omega)]).value;
  const below: Complex = [forward[0] + open * Math.cos(angle), forward[1] + open * Math.sin(angle)];
  return squaredModulus(forward) / squaredModulus(below);
}

/** `count` frequencies from `low` to `high`, equal ratios, both ends exact. */
export function logarithmicPoints(low: number, high: number, count: number): Float64Array {
  const points = Float64Array.from({ length: count }, (_, i) => low * (high / low) ** (i / (count - 1)));
  points[count - 1] = high;
  return points;
}
