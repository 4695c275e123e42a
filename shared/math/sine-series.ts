/**
 * An odd function of a period as Σ s_n sin(2πnx/period), n = 1 … points − 1: through its values at the multiples of
 * half a period over `points`, so exact for a function without higher harmonics.
 *
 * @param points 2 or more
 */
export function sineSeries(odd: (x: number) => number, period: number, points: number): (x: number) => number {
  const values = Array.from({ length: points - 1 }, (_, j) => odd((period * (j + 1)) / (2 * points)));
  const sines = Array.from({ length: 2 * points }, (_, j) => Math.sin((Math.PI * j) / points));
  const share = values.map((_, n) =>
    values.reduce((sum, value, j) => sum + (2 / points) * value * sines[((n + 1) * (j + 1)) % (2 * points)]!, 0),
  );
  return (x) => sineSum(share, (2 * Math.PI * x) / period);
}

/** Σ share[n − 1]·sin(nθ) by Clenshaw's recurrence. */
function sineSum(share: readonly number[], theta: number): number {
  const twice = 2 * Math.cos(theta);
  let before = 0;
  let sum = 0;
  for (let n = share.length - 1; n >= 0; n -= 1) {
    const next = share[n]! + twice * sum - before;
    before = sum;
    sum = next;
  }
  return sum * Math.sin(theta);
}
