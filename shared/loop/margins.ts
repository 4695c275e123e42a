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

/** |L|² and arg L, without wrapping, at ω in radians per update. */
export function openLoop(loop: LinearLoop, omega: number): { power: number; phase: number } {
  const { g1, g2, g3 } = loop.gains;
  // y = 1 − z⁻¹ has 1/y = 1/2 − j·cot(ω/2)/2; the sum of gains over its powers keeps its angle within (−π, 0].
  const cotangent = 1 / (2 * Math.tan(omega / 2));
  const re = g1 + g2 / 2 + g3 * (1 / 4 - cotangent ** 2);
  const im = -cotangent * (g2 + g3);
  const weight = averagingWeight(loop.averaged);
  const averageRe = weight + (1 - weight) * Math.cos(omega);
  const averageIm = -(1 - weight) * Math.sin(omega);
  const chord = 2 * Math.sin(omega / 2);
  const power = ((re ** 2 + im ** 2) * (averageRe ** 2 + averageIm ** 2)) / chord ** 2;
  const angle = Math.atan2(im, re) + Math.atan2(averageIm, averageRe);
  return { power, phase: angle - (1 + loop.delay) * omega - (Math.PI - omega) / 2 };
}

/** Every frequency at which |L| passes 1. */
export function gainCrossings(loop: LinearLoop): GainCrossing[] {
  const level = (x: number): number => Math.log(openLoop(loop, Math.exp(x)).power);
  return signChanges(level, scanRange(loop)).map((x) => {
    const omega = Math.exp(x);
    return { omega, phaseMargin: Math.PI + openLoop(loop, omega).phase };
  });
}

/** Margins of a loop with its delay. */
export function margins(loop: LinearLoop): Margins {
  const phaseDeg = phaseMarginDeg(gainCrossings(loop), 0);
  if (!isStable(loop)) return { phaseDeg, gainUp: null, gainDown: null };
  const ratios = criticalRatios(loop);
  const up = ratios.filter((ratio) => ratio > 1);
  const down = ratios.filter((ratio) => ratio < 1);
  return { phaseDeg, gainUp: up.length ? Math.min(...up) : null, gainDown: down.length ? Math.max(...down) : null };
}

/** Least phase margin over the crossings with some updates of delay more (or fewer), degrees. */
export function phaseMarginDeg(crossings: readonly GainCrossing[], furtherDelay: number): number | null {
  if (crossings.length === 0) return null;
  return (Math.min(...crossings.map(({ omega, phaseMargin }) => phaseMargin - furtherDelay * omega)) * 180) / Math.PI;
}

/** Largest extra delay in updates that leaves the loop stable with these gains; null where no delay does. */
export function largestDelay(loop: LinearLoop): number | null {
  if (!isStable({ ...loop, delay: 0 })) return null;
  const spare = gainCrossings(loop).map(({ omega, phaseMargin }) => phaseMargin / omega + loop.delay);
  if (spare.length === 0) return null;
  return Math.max(0, Math.ceil(Math.min(...spare)) - 1);
}

/** Ratio by which the gain may grow before the loop is unstable, below 1 for a loop that is; null where none is. */
export function largestGain(loop: LinearLoop): number | null {
  if (isStable(loop)) return margins(loop).gainUp;
  const ratios = criticalRatios(loop).filter((ratio) => ratio < 1 && isStable(scaledLoop(loop, 0.999 * ratio)));
  return ratios.length ? Math.max(...ratios) : null;
}

/** Ratios of the gain that put a pole on the unit circle: 1/|L| wherever L is real and negative. */
function criticalRatios(loop: LinearLoop): number[] {
  const turns = (x: number): number => (openLoop(loop, Math.exp(x)).phase + Math.PI) / (2 * Math.PI);
  const crossings = wholeCrossings(turns, scanRange(loop)).map(Math.exp);
  // L(−1) is real; it is negative for an even delay, and then the circle is left at z = −1.
  if (loop.delay % 2 === 0) crossings.push(Math.PI);
  return crossings.map((omega) => 1 / Math.sqrt(openLoop(loop, omega).power));
}

/** Logarithms of the frequencies at which L is looked at: two decades below the crossing, up to just below π. */
function scanRange({ gains: { g1, g2, g3 } }: LinearLoop): Float64Array {
  const crossing = Math.max(g1, Math.sqrt(g2), Math.cbrt(g3));
  const low = Math.min(crossing, 1) / 100;
  return logarithmicPoints(low, Math.PI * (1 - 1e-7), 160).map(Math.log);
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
