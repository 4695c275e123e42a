/** The first whole number above `from`, at most `to`, at which a condition holds that fails at `from` and holds from some number on. */
export function bisectWhole(holds: (k: number) => boolean, from: number, to: number): number {
  let [low, high] = [from, to];
  if (holds(low)) return low;
  while (high - low > 1) {
    const middle = Math.floor((low + high) / 2);
    if (holds(middle)) high = middle;
    else low = middle;
  }
  return high;
}

/**
 * Largest value of a function at whole numbers: the best of some, refined between its two neighbours, where it is
 * taken to have one peak.
 *
 * @param points rising, at least one
 */
export function largestWhole(value: (k: number) => number, points: readonly number[]): { at: number; value: number } {
  let best = 0;
  let top = -Infinity;
  points.forEach((k, i) => {
    const here = value(k);
    if (here > top) [best, top] = [i, here];
  });
  let [low, high] = [points[Math.max(best - 1, 0)] as number, points[Math.min(best + 1, points.length - 1)] as number];
  while (high - low > 2) {
    const third = Math.floor((high - low) / 3);
    if (value(low + third) < value(high - third)) low += third;
    else high -= third;
  }
  let at = points[best] as number;
  for (let k = low; k <= high; k += 1) {
    const here = value(k);
    if (here > top) [at, top] = [k, here];
  }
  return { at, value: top };
}
