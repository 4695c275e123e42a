import { exponential } from './portable-math';
import type { TrialRandom } from './random';

/*
 * The normal distribution by inversion: one bit of a random word is the sign, the other 31 are v, and the value is
 * the x beyond which the upper tail is (v + ½)/2^32. The inverse is a table of parabolas: 64 to each octave of v, and
 * below v = 128 one for each v, so the tails are as exact as the rest. The largest magnitude is 6.34 σ (one in 2^32).
 */
const octaveSegments = 64;
const singles = 2 * octaveSegments;
const segments = singles + octaveSegments * 24;

const invSqrt2Pi = 0.3989422804014327;

/** Upper tail of the normal distribution beyond x ≥ 0. */
export function upperTail(x: number): number {
  const density = invSqrt2Pi * exponential((-x * x) / 2);
  if (x < 3) {
    let term = x;
    let sum = x;
    for (let n = 3; term > 1e-20 * sum; n += 2) sum += term *= (x * x) / n;
    return 0.5 - density * sum;
  }
  // Laplace's continued fraction.
  let fraction = x;
  for (let n = 60; n > 0; n--) fraction = x + n / fraction;
  return density / fraction;
}

/** The x ≥ 0 with the given upper tail, by Newton's method from a guess not far away. */
function inverseTail(tail: number, guess: number): number {
  let x = guess;
  for (let k = 0; k < 8; k++) x += (upperTail(x) - tail) / (invSqrt2Pi * exponential((-x * x) / 2));
  return x;
}

/** Three coefficients a segment: value at its start, and the parabola's first and second. */
function buildTable(): Float64Array {
  const table = new Float64Array(3 * segments);
  let x = 0;
  const at = (v: number): number => (x = v >= 2 ** 31 ? 0 : inverseTail(v * 2 ** -32, x));
  for (let segment = segments - 1; segment >= 0; segment--) {
    const [start, width] = span(segment);
    const end = at(start + width);
    const middle = at(start + width / 2);
    const begin = start === 0 ? middle : at(start);
    // Only the middle of a single v is ever read.
    const [first, second] = width === 1 ? [0, 0] : [4 * middle - 3 * begin - end, 2 * (begin + end) - 4 * middle];
    table.set([width === 1 ? middle : begin, first, second], 3 * segment);
  }
  return table;
}

/** First v of a segment and how many it covers. */
function span(segment: number): [number, number] {
  if (segment < singles) return [segment, 1];
  const octave = Math.floor((segment - singles) / octaveSegments) + 1;
  const place = (segment - singles) % octaveSegments;
  return [(octaveSegments + place) * 2 ** octave, 2 ** octave];
}

const table = buildTable();

/** The normal value that a random word stands for: mean 0, deviation 1. */
export function gaussianOf(word: number): number {
  const v = word >>> 1;
  let x: number;
  if (v < singles) x = table[3 * v]!;
  else {
    const octave = 25 - Math.clz32(v);
    const segment = singles + octaveSegments * (octave - 2) + (v >>> octave);
    const t = ((v & ((1 << octave) - 1)) + 0.5) / (1 << octave);
    x = table[3 * segment]! + t * (table[3 * segment + 1]! + t * table[3 * segment + 2]!);
  }
  return (word & 1) === 0 ? x : -x;
}

/** Next normal value of a stream. */
export const gaussian = (random: TrialRandom): number => gaussianOf(random.word());
