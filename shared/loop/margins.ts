import { bisect } from '../math/root-search';
import { logarithmicPoints } from './frequency-response';
import { averagingWeight, scaledLoop } from './linear-loop';
import type { LinearLoop } from './linear-loop';
import { isStable } from './noise-bandwidth';

export interface Margins {
  /** Least phase margin over the crossings, degrees; null where |L| never crosses 1. */
  phaseDeg: number | null;
  /** Ratio by which the gain may grow; null where there is no limit, or the loop is unstable. */
  gainUp: number | null;
  /** Ratio to which the gain may fall, likewise. */
  gainDown: number | null;
}

/** A frequency at which |L| = 1, and the phase of L above −π there. */
export interface GainCrossing {
  /** Radians per update. */
  omega: number;
  /** Radians; falls by `omega` with every further update of delay. */
  phaseMargin: number;
}

/** |L|² at ω in radians per update. */
export function openLoopPower({ gains: { g1, g2, g3 }, averaged }: LinearLoop, omega: number): number {
  const [sine, cosine] = [Math.sin(omega / 2), Math.cos(omega / 2)];
  const cotangent = cosine / (2 * sine);
  const re = g1 + g2 / 2 + g3 * (1 / 4 - cotangent * cotangent);
  const im = cotangent * (g2 + g3);
  const sum = (re * re + im * im) / (4 * sine * sine);
  if (averaged <= 1) return sum;
  // |a + (1 − a)·z⁻¹|² = 1 − 4a(1 − a)·sin²(ω/2).
  const weight = averagingWeight(averaged);
  return sum * (1 - 4 * weight * (1 - weight) * sine * sine);
}

/** arg L, without wrapping, at ω in radians per update. */
export function openLoopPhase(loop: LinearLoop, omega: number): number {
  const { g1, g2, g3 } = loop.gains;
  // y = 1 − z⁻¹ has 1/y = 1/2 − j·cot(ω/2)/2; the sum of gains over its powers keeps its angle within (−π, 0].
  const cotangent = 1 / (2 * Math.tan(omega / 2));
  const angle = Math.atan2(-cotangent * (g2 + g3), g1 + g2 / 2 + g3 * (1 / 4 - cotangent * cotangent));
  return angle + averagingPhase(loop.averaged, omega) - (1 + loop.delay) * omega - (Math.PI - omega) / 2;
}

function averagingPhase(averaged: number, omega: number): number {
  if (averaged <= 1) return 0;
  const weight = averagingWeight(averaged);
  return Math.atan2(-(1 - weight) * Math.sin(omega), weight + (1 - weight) * Math.cos(omega));
}

/** Every frequency at which |L| passes 1. */
export function gainCrossings(loop: LinearLoop): GainCrossing[] {
  if (loop.order === 0) return [];
  const level = (omega: number): number => openLoopPower(loop, omega) - 1;
  return signChanges(level, scanRange(loop)).map((omega) => ({
    omega,
    phaseMargin: Math.PI + openLoopPhase(loop, omega),
  }));
}

/** Margins of a loop with its delay, and how far its delay and its gain may grow. */
export interface StabilityLimits {
  margins: Margins;
  /** Largest extra delay in updates that leaves the loop stable with these gains; null where no delay does. */
  largestDelay: number | null;
  /** Ratio by which the gain may grow before the loop is unstable, below 1 for one that is; null where none is. */
  largestGain: number | null;
  crossings: GainCrossing[];
  /** Every ratio of the gain that puts a pole on the unit circle. */
  criticalRatios: number[];
}

export function stabilityLimits(loop: LinearLoop): StabilityLimits {
  const crossings = gainCrossings(loop);
  const phaseDeg = phaseMarginDeg(crossings, 0);
  const ratios = criticalRatios(loop);
  const delay = largestDelay(loop, crossings);
  if (!isStable(loop)) {
    const margins = { phaseDeg, gainUp: null, gainDown: null };
    return { margins, largestDelay: delay, largestGain: stableRatio(loop, ratios), crossings, criticalRatios: ratios };
  }
  const gainUp = leastOf(ratios.filter((ratio) => ratio > 1));
  const gainDown = largestOf(ratios.filter((ratio) => ratio < 1));
  return {
    margins: { phaseDeg, gainUp, gainDown },
    largestDelay: delay,
    largestGain: gainUp,
    crossings,
    criticalRatios: ratios,
  };
}

/** Least phase margin over the crossings with some updates of delay more (or fewer), degrees. */
export function phaseMarginDeg(crossings: readonly GainCrossing[], furtherDelay: number): number | null {
  const least = leastOf(crossings.map(({ omega, phaseMargin }) => phaseMargin - furtherDelay * omega));
  return least === null ? null : (least * 180) / Math.PI;
}

function largestDelay(loop: LinearLoop, crossings: readonly GainCrossing[]): number | null {
  if (!isStable({ ...loop, delay: 0 })) return null;
  const least = leastOf(crossings.map(({ omega, phaseMargin }) => phaseMargin / omega + loop.delay));
  return least === null ? null : Math.max(0, Math.ceil(least) - 1);
}

/** The ratio to which the gain of an unstable loop has to fall. */
const stableRatio = (loop: LinearLoop, ratios: readonly number[]): number | null =>
  largestOf(ratios.filter((ratio) => ratio < 1 && isStable(scaledLoop(loop, 0.999 * ratio))));

const leastOf = (values: readonly number[]): number | null => (values.length ? Math.min(...values) : null);
const largestOf = (values: readonly number[]): number | null => (values.length ? Math.max(...values) : null);

/** Ratios of the gain that put a pole on the unit circle: 1/|L| wherever L is real and negative. */
function criticalRatios(loop: LinearLoop): number[] {
  const turns = (omega: number): number => (openLoopPhase(loop, omega) + Math.PI) / (2 * Math.PI);
  const crossings = wholeCrossings(turns, scanRange(loop));
  // L(−1) is real; it is negative for an even delay, and then the circle is left at z = −1.
  if (loop.delay % 2 === 0) crossings.push(Math.PI);
  return crossings.map((omega) => 1 / Math.sqrt(openLoopPower(loop, omega)));
}

const scanPoints = 112;

/** Frequencies at which L is looked at, radians per update: two decades below the crossing, up to just below π. */
function scanRange({ gains: { g1, g2, g3 } }: LinearLoop): Float64Array {
  const crossing = Math.max(g1, Math.sqrt(g2), Math.cbrt(g3));
  const low = Math.min(crossing, 1) / 100;
  return logarithmicPoints(low, Math.PI * (1 - 1e-7), scanPoints);
}

function signChanges(value: (x: number) => number, points: Float64Array): number[] {
  const values = points.map(value);
  const found: number[] = [];
  for (let i = 1; i < points.length; i += 1) {
    if ((values[i - 1] as number) > 0 !== (values[i] as number) > 0) {
      found.push(bisect(value, points[i - 1] as number, points[i] as number));
    }
  }
  return found;
}

/** Places at which a function passes a whole number. */
function wholeCrossings(value: (x: number) => number, points: Float64Array): number[] {
  const values = points.map(value);
  const found: number[] = [];
  for (let i = 1; i < points.length; i += 1) {
    const [before, after] = [Math.floor(values[i - 1] as number), Math.floor(values[i] as number)];
    for (let whole = Math.min(before, after) + 1; whole <= Math.max(before, after); whole += 1) {
      found.push(bisect((x) => value(x) - whole, points[i - 1] as number, points[i] as number));
    }
  }
  return found;
}
