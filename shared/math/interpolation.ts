/**
 * A curve between its points: straight lines, its end values outside.
 *
 * @param x rising
 * @param y one value for each x
 * @returns 0 for a curve without points
 */
export function interpolate(x: readonly number[], y: readonly number[], at: number): number {
  const right = x.findIndex((value) => value >= at);
  if (right <= 0) return (right === 0 ? y[0] : y.at(-1)) ?? 0;
  const span = x[right]! - x[right - 1]!;
  const share = (at - x[right - 1]!) / span;
  return y[right - 1]! + share * (y[right]! - y[right - 1]!);
}
