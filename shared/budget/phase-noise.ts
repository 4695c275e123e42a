import { circlePoints, responsePowers } from '../loop/frequency-response';
import type { CirclePoints } from '../loop/frequency-response';
import type { LinearLoop } from '../loop/linear-loop';
import { gaussLegendre } from '../math/gauss-legendre';

/** Oscillator phase noise: [offset Hz, dBc/Hz], offsets rising, at least two. */
export type PhaseNoiseTable = readonly (readonly [offsetHz: number, levelDbc: number])[];

/** Where the integration starts, over the slowest loop: below it |1 − H|² falls by 40 dB a decade or more. */
const below = 1e-3;
/** No lower than this, radians per update: whatever a table says there, a loop of 1e-7 follows it. */
const lowest = 1e-20;
const rule = gaussLegendre(6);
/** Widest panel, over ln ω, and most change of ln(S_φ·f) in one. */
const widestPanel = 0.8;
const steepestPanel = 7;
/** A table's 300 dB between two points are ten such changes; rounding makes more of them where offsets all but coincide. */
const mostPanels = 32;
/** Offsets nearer to one another, over ln ω, are one panel: a step so small would not move them. */
const leastSpan = 1e-9;
/** Most turn of z^(1+D) in a panel, radians. */
const mostTurn = 5;

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
  const [start, end] = [Math.log(from[0]), Math.log(to[0])];
  // Offsets so close that their logarithms meet are a step.
  const share = end > start ? Math.min(1, Math.max(0, (Math.log(frequencyHz) - start) / (end - start))) : 1;
  return from[1] + (to[1] - from[1]) * share;
}

/** Phase noise laid out over frequency once, for loops of one order, delay and averaging and any gains. */
export interface PhaseNoiseGrid {
  points: CirclePoints;
  /** S_φ(f)·df of each point, rad². */
  weights: Float64Array;
}

/**
 * Panels over ln ω that end where the table has a point, six Gauss points each: within a panel S_φ is a power of f, and
 * |1 − H|² is smooth.
 *
 * @param loop any loop of the family
 * @param slowestOmega the lowest loop frequency that will be asked for, radians per update
 */
export function phaseNoiseGrid(
  table: PhaseNoiseTable,
  loop: LinearLoop,
  slowestOmega: number,
  updateRateHz: number,
): PhaseNoiseGrid {
  const perHz = (2 * Math.PI) / updateRateHz;
  const offsets = table.map(([offsetHz]) => perHz * offsetHz);
  const low = Math.max(lowest, Math.min(slowestOmega, 1, offsets[0] as number) * below);
  const ends = [low, ...offsets.filter((offset) => offset > low && offset < Math.PI), Math.PI];
  const omega: number[] = [];
  const widths: number[] = [];
  for (let i = 1; i < ends.length; i += 1) {
    for (const [from, to] of panels(table, loop, [ends[i - 1] as number, ends[i] as number], perHz)) {
      const [middle, reach] = [Math.sqrt(from * to), Math.log(to / from) / 2];
      rule.nodes.forEach((node) => omega.push(middle * Math.exp(reach * node)));
      rule.weights.forEach((weight) => widths.push(reach * weight));
    }
  }
  const weights = Float64Array.from(widths, (width, i) => {
    const frequencyHz = (omega[i] as number) / perHz;
    return phaseNoiseDensity(table, frequencyHz) * frequencyHz * width;
  });
  return { points: circlePoints(loop, Float64Array.from(omega)), weights };
}

/** Cuts the stretch between two points of the table into panels. */
function panels(table: PhaseNoiseTable, loop: LinearLoop, [from, to]: [number, number], perHz: number) {
  const span = Math.log(to / from);
  if (!(span > leastSpan)) return [[from, to] as [number, number]];
  const middle = phaseNoiseDensity(table, Math.sqrt(from * to) / perHz);
  const near = phaseNoiseDensity(table, (from * Math.exp(span / 4)) / perHz);
  const slope = Math.abs((4 * Math.log(middle / near)) / span + 1);
  const width = Math.max(Math.min(widestPanel, steepestPanel / Math.max(slope, 1e-9)), span / mostPanels);
  const cuts = [from];
  for (let at = from; at < to;) {
    const turning = Math.log(1 + mostTurn / ((1 + loop.delay) * at));
    const next = at * Math.exp(Math.min(width, turning));
    // Two offsets may lie so close together that no number is between them.
    at = next > at && next < to * (1 - 1e-9) ? next : to;
    cuts.push(at);
  }
  return cuts.slice(1).map((cut, i): [number, number] => [cuts[i] as number, cut]);
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
