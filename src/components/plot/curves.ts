import type { Series } from './plot-model';
import type { PlotScales } from './scales';

/** Height of a curve at x between its points; undefined outside them. Straight in the axis's own scale. */
export function heightAt(points: Series['points'], x: number, across: (value: number) => number): number | undefined {
  const after = points.findIndex(([px]) => px >= x);
  const [right, left] = [points[after], points[after - 1]];
  if (!right) return undefined;
  if (right[0] === x || !left) return right[0] === x ? right[1] : undefined;
  const share = (across(x) - across(left[0])) / (across(right[0]) - across(left[0]));
  return left[1] + share * (right[1] - left[1]);
}

/** A curve sampled at every fourth pixel: what labels must not cross. */
export function traceOf(points: Series['points'], { x, y, left, right }: PlotScales): (number | undefined)[] {
  const trace: (number | undefined)[] = [];
  let after = 0;
  for (let pixel = left; pixel <= right; pixel += traceStep) {
    while (after < points.length && x(points[after]![0]) < pixel) after += 1;
    const [next, last] = [points[after], points[after - 1]];
    if (!next) trace.push(undefined);
    else if (!last) trace.push(Math.abs(x(next[0]) - pixel) < traceStep ? y(next[1]) : undefined);
    else {
      const [x0, x1] = [x(last[0]), x(next[0])];
      trace.push(y(last[1]) + ((pixel - x0) / (x1 - x0 || 1)) * (y(next[1]) - y(last[1])));
    }
  }
  return trace;
}

export const traceStep = 4;
