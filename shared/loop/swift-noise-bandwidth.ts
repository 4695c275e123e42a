import { forwardPolynomial, delayExponent } from './linear-loop';
import type { LinearLoop } from './linear-loop';
import { noiseBandwidth } from './noise-bandwidth';
import { swiftEnergies } from './swift-energies';

/** Share of the result that doubles may lose; beyond it the recursion in double-double is taken. */
const mostLost = 1e-5;

/**
 * The noise bandwidth of `noiseBandwidth` in doubles, some ten times faster: for curves, and for searches whose
 * end is worked out again. It loses some 1e−15/(ωnTu)^n of the result, for usual loops 1e−9. A loop so slow that doubles would lose more takes the exact way.
 *
 * @returns Bn·Tu, cycles per update; null for an unstable loop, or one without gain
 */
export function swiftNoiseBandwidth(loop: LinearLoop): number | null {
  if (loop.order === 0) return null;
  return isSwift(loop) ? halfEnergy(loop) : noiseBandwidth(loop);
}

/** Whether a loop is fast enough for doubles to keep what curves need. */
export function isSwift({ gains: { g1, g2, g3 }, order }: LinearLoop): boolean {
  const slowness = order === 3 ? g3 : order === 2 ? g2 : g1;
  return 1e-15 / slowness < mostLost;
}

function halfEnergy(loop: LinearLoop): number | null {
  const { a, b } = polynomialsInZ(loop);
  const energy = swiftEnergies(a, [{ plain: b, weighted: null }])?.[0];
  return energy !== undefined && energy > 0 ? energy / 2 : null;
}

/** Denominator z^E·(z − 1)^n + M and numerator M in z, highest power first, of one length. */
export function polynomialsInZ(loop: LinearLoop): { a: Float64Array; b: Float64Array } {
  const exponent = delayExponent(loop);
  const length = exponent + loop.order + 1;
  const [a, b] = [new Float64Array(length), new Float64Array(length)];
  const integrators = [[1], [1, -1], [1, -2, 1], [1, -3, 3, -1]][loop.order] as number[];
  integrators.forEach((value, i) => (a[i] = value));
  const forward = inPowersOfZ(forwardPolynomial(loop));
  forward.forEach((value, i) => {
    const place = length - forward.length + i;
    b[place] = value;
    a[place] = (a[place] as number) + value;
  });
  return { a, b };
}

/** A polynomial in w = z − 1, constant first, in powers of z, highest first: Horner's rule in z − 1. */
export function inPowersOfZ(coefficients: readonly number[]): number[] {
  let powers: number[] = [];
  for (const coefficient of [...coefficients].reverse()) {
    const next = [...powers, 0].map((value, i) => value - (powers[i - 1] ?? 0));
    next[next.length - 1] = (next[next.length - 1] as number) + coefficient;
    powers = next;
  }
  return powers;
}
