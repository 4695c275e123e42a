import { dampingOf, multiplyModulo, powerModulo } from '../math/pole-pair';
import type { PolePair, Remainder } from '../math/pole-pair';
import { averagingWeight } from './linear-loop';
import type { LinearLoop } from './linear-loop';

/** A loop on the way from no delay to its own: D + fraction updates, weight a of A(z). */
interface Waypoint {
  g1: number;
  g2: number;
  delay: number;
  weight: number;
}

/** Relative change of a pair over one step of the way: less than half the distance to where pairs can be mistaken. */
const largestChange = 0.3;
const smallestStep = 1 / 4096;

/**
 * The pole pair of an order-2 loop that carries its damping: the two poles of D = 0, followed while the delay grows
 * (and, where errors are averaged, while the averaging sets in). Part of an update of delay is taken as linear
 * interpolation between two whole delays.
 *
 * @returns null for another order, and where the pair meets another pole on the way
 */
export function dominantPair(loop: LinearLoop): PolePair | null {
  if (loop.order !== 2) return null;
  const { g1, g2 } = loop.gains;
  let pair: PolePair = { alpha: g1 + g2, beta: g2 };
  let [reached, step] = [0, 1];
  while (reached < 1) {
    const next = Math.min(reached + step, 1);
    const found = solvePair(waypoint(loop, next), pair);
    if (found && isNear(found, pair)) {
      [pair, reached, step] = [found, next, 2 * step];
    } else if (step > smallestStep) {
      step /= 2;
    } else return null;
  }
  return pair;
}

/** Damping factor and θ of the dominant pair; null where there is none. */
export function dominantDamping(loop: LinearLoop): { damping: number; theta: number } | null {
  const pair = dominantPair(loop);
  return pair && dampingOf(pair);
}

function waypoint({ gains, delay, averaged }: LinearLoop, share: number): Waypoint {
  return { g1: gains.g1, g2: gains.g2, delay: share * delay, weight: 1 + share * (averagingWeight(averaged) - 1) };
}

const isNear = (found: PolePair, before: PolePair): boolean =>
  Math.abs(found.beta - before.beta) < largestChange * Math.abs(before.beta) &&
  Math.abs(found.alpha - before.alpha) < 2 * largestChange * Math.sqrt(Math.abs(before.beta));

/** Newton's method for the pair that divides z^D·(1 + f·w)·z·w² + N(w)·(1 + a·w), from a pair nearby. */
function solvePair(at: Waypoint, start: PolePair): PolePair | null {
  let pair = start;
  for (let round = 0; round < 12; round += 1) {
    const step = newtonStep(at, pair);
    if (!step) return null;
    pair = { alpha: pair.alpha + step.alpha, beta: pair.beta + step.beta };
    if (Math.abs(step.beta) <= 1e-14 * pair.beta && Math.abs(step.alpha) <= 1e-14 * Math.sqrt(pair.beta)) return pair;
  }
  return null;
}

function newtonStep(at: Waypoint, pair: PolePair): PolePair | null {
  const scale = Math.sqrt(Math.abs(pair.beta));
  const [alphaNudge, betaNudge] = [1e-6 * scale, 1e-6 * pair.beta];
  const rest = remainder(at, pair);
  const byAlpha = difference(remainder(at, { ...pair, alpha: pair.alpha + alphaNudge }), rest, alphaNudge);
  const byBeta = difference(remainder(at, { ...pair, beta: pair.beta + betaNudge }), rest, betaNudge);
  const determinant = byAlpha.u * byBeta.v - byAlpha.v * byBeta.u;
  const alpha = (byBeta.u * rest.v - byBeta.v * rest.u) / determinant;
  const beta = (byAlpha.v * rest.u - byAlpha.u * rest.v) / determinant;
  return Number.isFinite(alpha) && Number.isFinite(beta) && pair.beta > 0 ? { alpha, beta } : null;
}

const difference = (a: Remainder, b: Remainder, by: number): Remainder => ({
  u: (a.u - b.u) / by,
  v: (a.v - b.v) / by,
});

function remainder({ g1, g2, delay, weight }: Waypoint, pair: PolePair): Remainder {
  const whole = Math.floor(delay);
  const delayed = multiplyModulo(powerModulo(whole, pair), { u: delay - whole, v: 1 }, pair);
  const doubleIntegral = multiplyModulo(delayed, { u: -pair.alpha, v: -pair.beta }, pair);
  const forward: Remainder = { u: g1 + g2, v: g2 };
  if (weight === 1) return { u: doubleIntegral.u + forward.u, v: doubleIntegral.v + forward.v };
  const back = multiplyModulo(doubleIntegral, { u: 1, v: 1 }, pair);
  const averaged = multiplyModulo(forward, { u: weight, v: 1 }, pair);
  return { u: back.u + averaged.u, v: back.v + averaged.v };
}
