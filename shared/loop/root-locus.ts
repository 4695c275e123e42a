import type { RootLocus } from '../model/design';
import { logarithmicPoints } from './frequency-response';
import { scaledLoop } from './linear-loop';
import type { LinearLoop } from './linear-loop';
import { polesNear } from './poles';

const ratios = 41;
/** Branches that are followed beside those of the integrators: a long delay has as many as updates, most of them far inside. */
const delayBranches = 4;
const [least, most] = [1 / 20, 4];
/** Beyond the ratio at which the loop turns unstable, so that the crossing shows. */
const beyond = 1.6;
/** Places of a pole that a drawing needs, also of a slow one close to 1. */
const drawnUnit = 1e-9;

/**
 * Closed-loop poles while the gain changes: those of the integrators and the largest of the delay's, each followed from
 * the stage's own gain in both directions.
 *
 * @param poles every pole at the stage's own gain, the largest modulus first
 * @param critical ratios of the gain that put a pole on the unit circle
 * @returns ratios rising, 1 among them; one list of [re, im] for each ratio, the branches in the same order in all
 */
export function rootLocus(
  loop: LinearLoop,
  poles: readonly (readonly [number, number])[],
  critical: readonly number[],
): RootLocus {
  const sorted = [...critical].sort((a, b) => a - b);
  if (poles.length === 0) return { ratio: [], poles: [], critical: sorted };
  const start = branchesOf(poles, loop.order + delayBranches);
  const [below, above] = [downward(sorted), upward(sorted)];
  const followed = (steps: number[]) => follow(loop, start, steps);
  return {
    ratio: [...below].reverse().concat(1, above),
    poles: [...followed(below).reverse(), start.map(rounded), ...followed(above)],
    critical: sorted,
  };
}

/** The first poles, with the conjugate of the last where it would be cut off. */
function branchesOf(poles: readonly (readonly [number, number])[], count: number): [number, number][] {
  const kept = poles.slice(0, count).map(([re, im]): [number, number] => [re, im]);
  const next = poles[count];
  const last = kept.at(-1);
  if (next && last && last[1] > 0 && next[1] === -last[1]) kept.push([next[0], next[1]]);
  return kept;
}

function downward(critical: readonly number[]): number[] {
  const low = critical.find((ratio) => ratio < 1) ?? 1;
  return steps(Math.min(least, low / beyond));
}

function upward(critical: readonly number[]): number[] {
  const high = critical.find((ratio) => ratio > 1) ?? 1;
  return steps(Math.max(most, high * beyond));
}

/** Ratios from beside 1 to an end. */
const steps = (end: number): number[] => Array.from(logarithmicPoints(1, end, (ratios - 1) / 2 + 1)).slice(1);

/** Each ratio's poles, found from those of the ratio before. */
function follow(loop: LinearLoop, start: readonly [number, number][], along: number[]): [number, number][][] {
  let at = start;
  return along.map((ratio) => {
    at = polesNear(scaledLoop(loop, ratio), at);
    return at.map(rounded);
  });
}

const rounded = ([re, im]: readonly [number, number]): [number, number] => [round(re), round(im)];
const round = (value: number): number => Math.round(value / drawnUnit) * drawnUnit || 0;
