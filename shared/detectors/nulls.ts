import type { DetectorModel } from './detector';

export interface DetectorNull {
  /** Radians (carrier) or symbols (clock), above −½ period and up to ½. */
  x: number;
  /** A loop settles here: the curve rises through it. */
  stable: boolean;
  /** Lock itself. */
  lock: boolean;
}

const intervals = 180;
/** Values this small against the largest are rounding. */
const rounding = 1e-9;

/** Zeros of an S-curve with noise over one period, rising. */
export function nullsOf({ noisy, period }: Pick<DetectorModel, 'noisy' | 'period'>): DetectorNull[] {
  // Half a step off the grid, so that lock and the middle between two locks lie inside an interval.
  const at = (i: number): number => period * ((i + 0.5) / intervals - 0.5);
  const values = Array.from({ length: intervals }, (_, i) => noisy(at(i)));
  const largest = Math.max(...values.map(Math.abs));
  const clear = values.flatMap((value, i) => (Math.abs(value) > rounding * largest ? [i] : []));
  return clear.flatMap((i, k) => {
    const next = clear[k + 1] ?? clear[0]! + intervals;
    const [before, after] = [values[i]!, values[next % intervals]!];
    if (before > 0 === after > 0) return [];
    const root = zeroBetween(noisy, { x: at(i), value: before }, { x: at(next), value: after });
    const x = root > (period / 2) * (1 + 1e-6) ? root - period : root;
    const lock = Math.abs(x) < 1e-6 * period;
    return [{ x: lock ? 0 : Math.min(x, period / 2), stable: after > 0, lock }];
  });
}

interface Sample {
  x: number;
  value: number;
}

/** The middle of an interval first, where symmetry puts most zeros, then chords that halve an end that stays. */
function zeroBetween(curve: (x: number) => number, from: Sample, to: Sample): number {
  let [low, high] = [from, to];
  const width = to.x - from.x;
  const close = 1e-9 * Math.max(Math.abs(from.value), Math.abs(to.value));
  let x = (low.x + high.x) / 2;
  for (let round = 0; round < 40; round += 1) {
    const value = curve(x);
    if (Math.abs(value) <= close || high.x - low.x < 1e-7 * width) break;
    if (value > 0 === low.value > 0)
      [low, high] = [
        { x, value },
        { ...high, value: high.value / 2 },
      ];
    else
      [low, high] = [
        { ...low, value: low.value / 2 },
        { x, value },
      ];
    x = low.x - (low.value * (high.x - low.x)) / (high.value - low.value);
  }
  return x;
}
