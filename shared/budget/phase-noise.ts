import { circlePoints, logarithmicPoints, responsePowers } from '../loop/frequency-response';
import type { CirclePoints } from '../loop/frequency-response';
import type { LinearLoop } from '../loop/linear-loop';

/** Oscillator phase noise: [offset Hz, dBc/Hz], offsets rising, at least two. */
export type PhaseNoiseTable = readonly (readonly [offsetHz: number, levelDbc: number])[];

const gridPoints = 240;
/** Where the integration starts, below every loop and every offset of the table. */
const decadesBelow = 3;

/**
 * One-sided spectral density of phase S_φ(f) = 2·10^(L(f)/10), rad²/Hz: straight lines between the points of the
 * table in decibels over log f, −30 dB a decade below it, flat above it.
 */
export function phaseNoiseDensity(table: PhaseNoiseTable, frequencyHz: number): number {
  const [first, last] = [table[0], table[table.length - 1]] as [[number, number], [number, number]];
  let level = last[1];
  if (frequencyHz <= first[0]) level = first[1] - 30 * Math.log10(frequencyHz / first[0]);
  else if (frequencyHz < last[0]) level = levelBetween(table, frequencyHz);
  return 2 * 10 ** (level / 10);
}

function levelBetween(table: PhaseNoiseTable, frequencyHz: number): number {
  const above = table.findIndex(([offset]) => offset >= frequencyHz);
  const [from, to] = [table[above - 1], table[above]] as [[number, number], [number, number]];
  return from[1] + ((to[1] - from[1]) * Math.log(frequencyHz / from[0])) / Math.log(to[0] / from[0]);
}

/** Phase noise laid out over frequency once, for loops of one order, delay and averaging and any gains. */
export interface PhaseNoiseGrid {
  points: CirclePoints;
  /** S_φ(f)·df of each point, rad². */
  weights: Float64Array;
}

/**
 * @param loop any loop of the family
 * @param slowestOmega the lowest loop frequency that will be asked for, radians per update
 */
export function phaseNoiseGrid(
  table: PhaseNoiseTable,
  loop: LinearLoop,
  slowestOmega: number,
  updateRateHz: number,
): PhaseNoiseGrid {
  const low = Math.min(slowestOmega, 1) * 10 ** -decadesBelow;
  const omega = logarithmicPoints(low, Math.PI, gridPoints);
  const step = Math.log(Math.PI / low) / (gridPoints - 1);
  const weights = omega.map((value, i) => {
    const frequencyHz = (value / (2 * Math.PI)) * updateRateHz;
    const share = i === 0 || i === gridPoints - 1 ? 0.5 : 1;
    return phaseNoiseDensity(table, frequencyHz) * frequencyHz * step * share;
  });
  return { points: circlePoints(loop, omega), weights };
}

/**
 * Variance of the phase that the loop does not follow, ∫ S_φ |1 − H|² df up to half the update rate, rad².
 *
 * @returns null for a loop of order 1, which leaves an unbounded variance of noise that rises by 30 dB a decade
 */
export function oscillatorVariance(loop: LinearLoop, { points, weights }: PhaseNoiseGrid): number | null {
  if (loop.order < 2) return null;
  const { e } = responsePowers(loop, points);
  return e.reduce((sum, value, i) => sum + value * (weights[i] as number), 0);
}
