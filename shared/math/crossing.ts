import { bisect } from './root-search';

/** Where a curve passes a level. */
export interface Crossing {
  x: number;
  /** The curve rises there. */
  rising: boolean;
}

/**
 * Places where a sampled curve passes a level, both on logarithmic scales, by a cubic through the four points around each.
 *
 * @param x rising, above 0
 * @param y above 0; null where the curve has no value
 */
export function logarithmicCrossings(x: readonly number[], y: readonly (number | null)[], level: number): Crossing[] {
  const points = x.flatMap((at, i): [number, number][] => {
    const value = y[i];
    return value === null || value === undefined || !(value > 0) ? [] : [[Math.log(at), Math.log(value / level)]];
  });
  const found: Crossing[] = [];
  for (let i = 1; i < points.length; i += 1) {
    const [before, after] = [points[i - 1] as [number, number], points[i] as [number, number]];
    if (before[1] < 0 === after[1] < 0) continue;
    const around = points.slice(Math.max(0, i - 2), i + 2);
    found.push({ x: Math.exp(bisect((x) => through(around, x), before[0], after[0])), rising: after[1] >= 0 });
  }
  return found;
}

/** The polynomial through the points (Lagrange). */
const through = (points: [number, number][], x: number): number =>
  points.reduce(
    (sum, [xi, yi], i) =>
      sum + points.reduce((product, [xj], j) => (i === j ? product : (product * (x - xj)) / (xi - xj)), yi),
    0,
  );

/**
 * Largest x at which a value that falls as x grows is still at or above a level, to a millionth.
 *
 * @param value null where there is none, which counts as below the level
 * @param start an x to begin at
 * @returns null where even the least x is below the level, Infinity where the largest is still at or above it
 */
export function lastAtLeast(
  value: (x: number) => number | null,
  level: number,
  { start, least, most }: { start: number; least: number; most: number },
): number | null {
  const gap = (x: number): number => (value(x) ?? -Infinity) - level;
  let [low, high] = [Math.min(Math.max(start, least), most), Math.min(Math.max(start, least), most)];
  let [lowGap, highGap] = [gap(low), gap(high)];
  while (lowGap < 0) {
    if (low <= least) return null;
    [high, highGap] = [low, lowGap];
    low = Math.max(low / 2, least);
    lowGap = gap(low);
  }
  while (highGap >= 0) {
    if (high >= most) return Infinity;
    [low, lowGap] = [high, highGap];
    high = Math.min(high * 2, most);
    highGap = gap(high);
  }
  for (let round = 0; round < 60 && high > low * (1 + 1e-6); round += 1) {
    const guess = round % 3 < 2 && Number.isFinite(highGap) ? low + ((high - low) * lowGap) / (lowGap - highGap) : NaN;
    const x = guess > low && guess < high ? guess : Math.sqrt(low * high);
    const here = gap(x);
    if (here >= 0) [low, lowGap] = [x, here];
    else [high, highGap] = [x, here];
    if (here >= 0 && here < 1e-7 * Math.abs(level)) break;
  }
  return low;
}
