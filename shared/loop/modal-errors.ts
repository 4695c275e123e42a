import { add, divide, multiply, power, squaredModulus, subtract } from '../math/complex';
import type { Complex } from '../math/complex';
import { delayExponent, forwardPolynomial } from './linear-loop';
import type { LinearLoop } from './linear-loop';

/** Phase error of a loop at update k after something has happened to its input at update 0. */
export interface ErrorResponses {
  /** Input phase 1 from update 0 on. */
  step: (k: number) => number;
  /** Input phase k: the frequency has risen by one radian (symbol) per update. */
  frequency: (k: number) => number;
  /** Input phase k(k + 1)/2: the frequency rises by one more at every update. */
  ramp: (k: number) => number;
}

/** One closed-loop pole: logarithm of its modulus, its angle, and what it adds to each response. */
interface Mode {
  decay: number;
  angle: number;
  step: Complex;
  frequency: Complex;
  ramp: Complex;
}

/** Poles nearer than this share of their distance from z = 1 are set apart: two equal ones have no residues. */
const leastSeparation = 1e-5;
/** Terms below this are left out. */
const negligible = 1e-18;

/**
 * The error responses as sums over the closed-loop poles, at any update without simulating those before it:
 *
 *     E·U/z for U of a step, of k and of k(k + 1)/2 = z^E·w^(n−1)/P, z^E·w^(n−2)/P and z^(E+1)·w^(n−3)/P
 *
 * by partial fractions over w = z − 1, with the poles at w = 0 of a low order apart. Good to about 1e−9.
 *
 * @param poles every closed-loop pole in z, all simple but for rounding
 */
export function modalErrors(loop: LinearLoop, poles: readonly (readonly [number, number])[]): ErrorResponses {
  const roots = separated(poles);
  const modes = roots.map((_, i) => modeAt(loop, roots, i));
  const sum = (key: 'step' | 'frequency' | 'ramp', k: number): number =>
    modes.reduce((total, mode) => total + valueAt(mode, mode[key], k), 0);
  const { constant, slope } = poleAtOne(loop);
  const offsets = staticErrors(loop, constant, slope);
  return {
    step: (k) => sum('step', k),
    frequency: (k) => sum('frequency', k) + offsets.frequency,
    ramp: (k) => sum('ramp', k) + offsets.ramp + offsets.rampPerUpdate * k,
  };
}

/** The slope of P at a root is the product of its distances from the others: with it residues of close roots cancel as they must. */
function modeAt(loop: LinearLoop, roots: readonly Complex[], i: number): Mode {
  const w = roots[i] as Complex;
  const z: Complex = [1 + w[0], w[1]];
  const slope = roots.reduce<Complex>(
    (product, other, j) => (j === i ? product : multiply(product, subtract(w, other))),
    [1, 0],
  );
  const step = multiply(divide(power(z, delayExponent(loop)), slope), power(w, loop.order - 1));
  const frequency = divide(step, w);
  return {
    decay: 0.5 * Math.log1p(2 * w[0] + squaredModulus(w)),
    angle: Math.atan2(w[1], 1 + w[0]),
    step,
    frequency,
    ramp: divide(multiply(frequency, z), w),
  };
}

/** Real part of c·z^k; conjugate poles both stand in the list. */
function valueAt({ decay, angle }: Mode, [re, im]: Complex, k: number): number {
  const modulus = k === 0 ? 1 : Math.exp(decay * k);
  if (modulus < negligible) return 0;
  return modulus * (re * Math.cos(angle * k) - im * Math.sin(angle * k));
}

/** P = z^E·w^n + M and P′ at w = 0; its first term adds to the slope where n is 1. */
function poleAtOne(loop: LinearLoop): { constant: number; slope: number } {
  const [constant = 0, slope = 0] = forwardPolynomial(loop);
  return { constant, slope: slope + (loop.order === 1 ? 1 : 0) };
}

/** What the poles at w = 0 add, which a loop of too low an order for the input leaves. */
function staticErrors({ order, ...loop }: LinearLoop, constant: number, slope: number) {
  const held = 1 / constant;
  if (order > 2) return { frequency: 0, ramp: 0, rampPerUpdate: 0 };
  if (order === 2) return { frequency: 0, ramp: held, rampPerUpdate: 0 };
  const exponent = delayExponent({ order, ...loop }) + 1;
  return { frequency: held, ramp: exponent * held - slope * held ** 2, rampPerUpdate: held };
}

/** The poles over w, those that all but coincide pushed apart by as little as leaves their sum as it is. */
function separated(poles: readonly (readonly [number, number])[]): Complex[] {
  const found: Complex[] = poles.map(([re, im]) => [re - 1, im]);
  for (let i = 1; i < found.length; i += 1) {
    for (let j = 0; j < i; j += 1) {
      const [one, other] = [found[i] as Complex, found[j] as Complex];
      const distance = leastSeparation * Math.sqrt(squaredModulus(one));
      if (squaredModulus(subtract(one, other)) > distance ** 2) continue;
      const middle = add(one, other).map((part) => part / 2) as [number, number];
      found[i] = [middle[0] + distance, middle[1]];
      found[j] = [middle[0] - distance, middle[1]];
    }
  }
  return found;
}
