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
  const [wRe, wIm] = [new Float64Array(omega.length), new Float64Array(omega.length)];
  const [openRe, openIm] = [new Float64Array(omega.length), new Float64Array(omega.length)];
  for (let i = 0; i < omega.length; i += 1) {
    const value = omega[i] as number;
    const [sine, cosine] = [Math.sin(value / 2), Math.cos(value / 2)];
    wRe[i] = -2 * sine * sine;
    wIm[i] = 2 * sine * cosine;
    // w = 2·sin(ω/2)·e^j(π + ω)/2, so the modulus and the angle of z^E·w^n are known without multiplying.
    const modulus = chordPower(2 * sine, loop.order);
    const angle = exponent * value + (loop.order * (Math.PI + value)) / 2;
    openRe[i] = modulus * Math.cos(angle);
    openIm[i] = modulus * Math.sin(angle);
  }
  return { omega, wRe, wIm, openRe, openIm };
}

/** A whole power up to 3. */
function chordPower(chord: number, order: number): number {
  if (order === 2) return chord * chord;
  return order === 3 ? chord * chord * chord : order === 1 ? chord : 1;
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

/** |H|² at one frequency, radians per update, as a function of it. */
export function closedLoopPower(loop: LinearLoop): (omega: number) => number {
  const coefficients = forwardPolynomial(loop);
  const exponent = delayExponent(loop);
  return (omega) => {
    const [sine, cosine] = [Math.sin(omega / 2), Math.cos(omega / 2)];
    const [re, im] = [-2 * sine * sine, 2 * sine * cosine];
    let [forwardRe, forwardIm] = [0, 0];
    for (let k = coefficients.length - 1; k >= 0; k -= 1) {
      const next = forwardRe * re - forwardIm * im + (coefficients[k] as number);
      forwardIm = forwardRe * im + forwardIm * re;
      forwardRe = next;
    }
    const open = chordPower(2 * sine, loop.order);
    const angle = exponent * omega + (loop.order * (Math.PI + omega)) / 2;
    const [belowRe, belowIm] = [forwardRe + open * Math.cos(angle), forwardIm + open * Math.sin(angle)];
    return (forwardRe * forwardRe + forwardIm * forwardIm) / (belowRe * belowRe + belowIm * belowIm);
  };
}

/** `count` frequencies from `low` to `high`, equal ratios, both ends exact. */
export function logarithmicPoints(low: number, high: number, count: number): Float64Array {
  const points = new Float64Array(count);
  const step = Math.log(high / low) / (count - 1);
  for (let i = 0; i < count; i += 1) points[i] = low * Math.exp(step * i);
  points[count - 1] = high;
  return points;
}
