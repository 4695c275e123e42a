import { constellation, type Point } from '../fixed-point/constellation';
import type { TrialRandom } from './random';

/** Random symbols of a modulation, each equally likely. */
export interface SymbolSource {
  /** Points by index, E|a|² = 1. */
  readonly points: readonly Point[];
  /** Writes the indices of the next `count` symbols. */
  draw(random: TrialRandom, count: number, indices: Uint8Array): void;
}

/**
 * @param modulation one whose number of points is a power of two, lower case
 * @param ringRatios of an APSK constellation, as in the words
 */
export function symbolSource(modulation: string, ringRatios?: readonly number[]): SymbolSource {
  // A cosine may differ in its last bit between engines; cut to 2^−40 the points are the same everywhere.
  const portable = (value: number) => Math.floor(value * 2 ** 40 + 0.5) / 2 ** 40;
  const points = constellation(modulation, ringRatios).map(([i, q]): Point => [portable(i), portable(q)]);
  const bits = Math.log2(points.length);
  const perWord = Math.floor(32 / bits);
  return {
    points,
    draw(random, count, indices) {
      for (let k = 0; k < count;) {
        let word = random.word();
        for (let j = 0; j < perWord && k < count; j++, k++) {
          indices[k] = word & (points.length - 1);
          word >>>= bits;
        }
      }
    },
  };
}
