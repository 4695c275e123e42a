import type { LinearLoop } from '../loop/linear-loop';
import { isSwift, polynomialsInZ } from '../loop/swift-noise-bandwidth';
import { isThere, isWhite, loopVariances } from './loop-energies';
import type { LoopNoise, NoiseEntry } from './loop-energies';

/** One noise on its way: the numerator B of its entry and, where it is coloured, Σ c[l]·z^l·B. */
interface Running {
  noise: LoopNoise;
  plain: Float64Array;
  weighted: Float64Array | null;
  energy: number;
}

/**
 * The variances of `loopVariances` in doubles, several times faster, for curves and for searches whose end is worked out
 * again; a loop too slow for doubles takes the exact way.
 *
 * @returns null for an unstable loop, or one without gain
 */
export function swiftLoopVariances(loop: LinearLoop, noises: readonly LoopNoise[]): number[] | null {
  if (!isSwift(loop)) return loopVariances(loop, noises);
  const { a } = polynomialsInZ(loop);
  const there = noises.filter(isThere);
  const length = Math.max(a.length, ...there.map((noise) => loop.order + noise.covariance.length - 1));
  const running = there.map((noise) => begin(noise, numeratorOf(loop, noise.entry), length));
  if (!integrate(padded(a, length), running)) return null;
  return noises.map((noise) => running.find((each) => each.noise === noise)?.energy ?? 0);
}

function begin(noise: LoopNoise, terms: readonly number[], length: number): Running {
  const plain = new Float64Array(length);
  terms.forEach((term, i) => (plain[length - terms.length + i] = term));
  const weighted = isWhite(noise) ? null : new Float64Array(length);
  if (weighted) {
    noise.covariance.forEach((value, lag) => {
      const share = lag === 0 ? value : 2 * value;
      for (let i = lag; i < length; i += 1)
        weighted[i - lag] = (weighted[i - lag] as number) + share * (plain[i] as number);
    });
  }
  return { noise, plain, weighted, energy: 0 };
}

/** The numerator over z^E·(z − 1)^n + M, but for a power of z; noise on the error does not pass the averaging. */
function numeratorOf(loop: LinearLoop, entry: NoiseEntry): readonly number[] {
  if (entry === 'error') return plainForward(loop);
  const integrators = { word: 1, integrator: 2, integrator2: 3 }[entry];
  return [[1], [1, -1], [1, -2, 1]][loop.order - integrators] ?? [];
}

function plainForward({ gains: { g1, g2, g3 }, order }: LinearLoop): number[] {
  if (order === 3) return [g1 + g2 + g3, -(2 * g1 + g2), g1];
  return order === 2 ? [g1 + g2, -g1] : [g1];
}

function padded(values: Float64Array, length: number): Float64Array {
  if (values.length === length) return values;
  const wider = new Float64Array(length);
  wider.set(values);
  return wider;
}

/** The recursion of `loopVariances`, one degree after the other; false when a pole is not inside the circle. */
function integrate(a: Float64Array, running: Running[]): boolean {
  const lead = a[0] as number;
  const reversed = new Float64Array(a.length);
  for (let k = a.length - 1; k >= 0; k -= 1) {
    const top = a[0] as number;
    if (!(top > 0)) return false;
    for (let i = 0; i <= k; i += 1) reversed[i] = a[k - i] as number;
    for (const each of running) {
      const own = each.plain[k] as number;
      if (each.weighted) {
        const other = each.weighted[k] as number;
        each.energy += (own * other) / (top * lead);
        subtract(each.weighted, other / top, reversed, k);
      } else each.energy += (own * own * (each.noise.covariance[0] as number)) / (top * lead);
      subtract(each.plain, own / top, reversed, k);
    }
    subtract(a, (a[k] as number) / top, reversed, k);
  }
  return running.every(({ energy }) => Number.isFinite(energy));
}

function subtract(target: Float64Array, factor: number, source: Float64Array, count: number): void {
  for (let i = 0; i < count; i += 1) target[i] = (target[i] as number) - factor * (source[i] as number);
}
