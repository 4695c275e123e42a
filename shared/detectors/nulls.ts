import type { DetectorModel } from './detector';

export interface DetectorNull {
  /** Radians (carrier) or symbols (clock), above −½ period and up to ½. */
  x: number;
  /** A loop settles here: the curve rises through it. */
  stable: boolean;
  /** Lock itself. */
  lock: boolean;
}

/** Samples over half a period, half a step off its ends. */
const samples = 90;
/** Values this small against the largest are rounding. */
const rounding = 1e-9;

interface Sample {
  x: number;
  value: number;
}

/**
 * Zeros of an S-curve with noise over one period, rising. The curve is odd, so lock and the middle between two locks
 * are zeros, and all others come in pairs.
 */
export function nullsOf({ noisy, period }: Pick<DetectorModel, 'noisy' | 'period'>): DetectorNull[] {
  const places = Array.from({ length: samples }, (_, i) => (period * (i + 0.5)) / (2 * samples));
  const curve = places.map((x): Sample => ({ x, value: noisy(x) }));
  const largest = Math.max(...curve.map(({ value }) => Math.abs(value)));
  const clear = curve.filter(({ value }) => Math.abs(value) > rounding * largest);
  const right = clear.slice(1).flatMap((after, i): DetectorNull[] => {
    const before = clear[i]!;
    if (before.value > 0 === after.value > 0) return [];
    return [{ x: zeroBetween(noisy, before, after), stable: after.value > 0, lock: false }];
  });
  const left = right.map((zero) => ({ ...zero, x: -zero.x })).reverse();
  const atLock = { x: 0, stable: (clear[0]?.value ?? 0) > 0, lock: true };
  const between = { x: period / 2, stable: (clear.at(-1)?.value ?? 0) < 0, lock: false };
  return [...left, atLock, ...right, between];
}

/** By chords that halve the value at an end that stays (the Illinois rule). */
function zeroBetween(curve: (x: number) => number, from: Sample, to: Sample): number {
  let [low, high] = [from, to];
  const close = 1e-9 * Math.max(Math.abs(from.value), Math.abs(to.value));
  const narrow = 1e-7 * (to.x - from.x);
  let x = from.x;
  for (let round = 0; round < 60 && high.x - low.x > narrow; round += 1) {
    x = low.x - (low.value * (high.x - low.x)) / (high.value - low.value);
    const value = curve(x);
    if (Math.abs(value) <= close) break;
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
  }
  return x;
}
