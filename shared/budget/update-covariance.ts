/** Longer than this a covariance is summed up: a loop with so many updates a symbol sees a flat spectrum. */
const mostLags = 64;

/**
 * Autocovariance of what one update works with, from that of the errors of each symbol, both over lags from 0:
 *
 *     U > 1   mean of U errors:          (1/U²)·Σ (U − |j|)·c[|mU + j|],  |j| below U
 *     U = 1/m one error held m updates:  straight lines between the lags of the symbols, the mean over its phase
 *
 * @param updateInterval U, symbols per update: a whole number or 1/m
 */
export function updateCovariance(covariance: readonly number[], updateInterval: number): number[] {
  if (updateInterval === 1) return [...covariance];
  return updateInterval > 1
    ? averaged(covariance, Math.round(updateInterval))
    : held(covariance, Math.round(1 / updateInterval));
}

function averaged(covariance: readonly number[], count: number): number[] {
  const lags = Math.ceil((covariance.length + count - 1) / count);
  return Array.from({ length: lags }, (_, lag) => {
    let sum = 0;
    for (let j = 1 - count; j < count; j += 1)
      sum += (count - Math.abs(j)) * (covariance[Math.abs(lag * count + j)] ?? 0);
    return sum / count ** 2;
  });
}

function held(covariance: readonly number[], updates: number): number[] {
  const lags = covariance.length * updates;
  if (lags > mostLags) return [updates * covariance.reduce((sum, value, lag) => sum + (lag ? 2 : 1) * value, 0)];
  return Array.from({ length: lags }, (_, i) => {
    const [lag, share] = [Math.floor(i / updates), (i % updates) / updates];
    return (1 - share) * (covariance[lag] as number) + share * (covariance[lag + 1] ?? 0);
  });
}

/**
 * A covariance as the symbols see its effect. With U > 1 the oscillator turns in U even steps from one update to the
 * next; on the mean over these the variance is that at the updates less 2·mean p(1 − p) = (1 − 1/U²)/3 of what one update
 * changes:
 *
 *     c ∗ [q/2, 1 − q, q/2],   q = (1 − 1/U²)/3
 */
export function seenBySymbols(covariance: readonly number[], updateInterval: number): number[] {
  if (updateInterval <= 1) return [...covariance];
  const share = (1 - 1 / updateInterval ** 2) / 3;
  const value = (lag: number): number => covariance[Math.abs(lag)] ?? 0;
  return Array.from(
    { length: covariance.length + 1 },
    (_, lag) => (1 - share) * value(lag) + (share / 2) * (value(lag - 1) + value(lag + 1)),
  );
}

/**
 * A covariance cut to so many lags, what is cut off laid on the last two so that the sum over all lags, its spectrum at 0,
 * stays, and so does the sum of the lags times it, which is what a slow loop sees next.
 */
export function shortened(covariance: readonly number[], lags: number): number[] {
  if (covariance.length <= lags) return [...covariance];
  const kept = covariance.slice(0, lags);
  const [before, last] = [lags - 2, lags - 1];
  covariance.slice(lags).forEach((value, i) => {
    // Straight through the last two lags, like the autocorrelation that it meets.
    const beyond = i + 1;
    kept[before] = (kept[before] as number) - beyond * value;
    kept[last] = (kept[last] as number) + (1 + beyond) * value;
  });
  return kept;
}
