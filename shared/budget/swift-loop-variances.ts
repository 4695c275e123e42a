import { forwardPolynomial } from '../loop/linear-loop';
import type { LinearLoop } from '../loop/linear-loop';
import { swiftEnergies } from '../loop/swift-energies';
import type { Numerators } from '../loop/swift-energies';
import { inPowersOfZ, isSwift, polynomialsInZ } from '../loop/swift-noise-bandwidth';
import { isThere, isWhite, loopVariances } from './loop-energies';
import type { LoopNoise, NoiseEntry } from './loop-energies';

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
  const length = Math.max(a.length, ...there.map(({ covariance }) => loop.order + covariance.length - 1));
  const numerators = there.map((noise) => numeratorsOf(noise, numeratorOf(loop, noise.entry), length));
  const energies = swiftEnergies(padded(a, length), numerators);
  if (!energies) return null;
  return noises.map((noise) => {
    const energy = energies[there.indexOf(noise)] ?? 0;
    return isWhite(noise) ? (noise.covariance[0] as number) * energy : energy;
  });
}

/** B, and Σ c[l]·z^l·B of a coloured noise, the lags of both signs together. */
function numeratorsOf(noise: LoopNoise, terms: readonly number[], length: number): Numerators {
  const plain = new Float64Array(length);
  terms.forEach((term, i) => (plain[length - terms.length + i] = term));
  if (isWhite(noise)) return { plain, weighted: null };
  const weighted = new Float64Array(length);
  noise.covariance.forEach((value, lag) => {
    const share = lag === 0 ? value : 2 * value;
    for (let i = lag; i < length; i += 1)
      weighted[i - lag] = (weighted[i - lag] as number) + share * (plain[i] as number);
  });
  return { plain, weighted };
}

/** The numerator over z^E·(z − 1)^n + M, but for a power of z; noise on the error does not pass the averaging. */
function numeratorOf(loop: LinearLoop, entry: NoiseEntry): readonly number[] {
  if (entry === 'error') return inPowersOfZ(forwardPolynomial({ ...loop, averaged: 1 }));
  const integrators = { word: 1, integrator: 2, integrator2: 3 }[entry];
  return [[1], [1, -1], [1, -2, 1]][loop.order - integrators] ?? [];
}

function padded(values: Float64Array, length: number): Float64Array {
  if (values.length === length) return values;
  const wider = new Float64Array(length);
  wider.set(values);
  return wider;
}
