import { ParameterError, requirePositive } from '../parameter-error';
import type { LoopGains } from './linear-loop';
import { publishedForm, thirdOrderBandwidth } from './third-order-form';
import type { ThirdOrderForm } from './third-order-form';

export interface SecondOrderPlacement {
  /** Damping factor ζ of the analog loop, above 0. */
  damping: number;
  /** θ = ωnTu/2, or tan(ωnTu/2) when pre-warped, above 0. */
  theta: number;
}

/**
 * Gains of order 1 whose pole is the bilinear image of s = −K.
 *
 *     θ = K·Tu/2,   g1 = 2θ/(1 + θ)
 */
export function firstOrderGains(theta: number): LoopGains {
  requirePositive({ theta });
  return { g1: (2 * theta) / (1 + theta), g2: 0, g3: 0 };
}

/**
 * Gains of order 2 whose poles at D = 0 are the bilinear image of s² + 2ζωn·s + ωn².
 *
 *     g1 = 4ζθ/(1 + 2ζθ + θ²),   g2 = 4θ²/(1 + 2ζθ + θ²)
 *
 * @throws {ParameterError} naming the first field that is not finite and above 0
 * @see M. Rice, "Digital Communications: A Discrete-Time Approach", 2009, appendix C
 * @example secondOrderGains({ damping: Math.SQRT1_2, theta: 0.01 / (1.5 * Math.SQRT1_2) }) // => 300/11401, 4/11401
 */
export function secondOrderGains({ damping, theta }: SecondOrderPlacement): LoopGains {
  requirePositive({ damping, theta });
  const scale = 1 + 2 * damping * theta + theta ** 2;
  return { g1: (4 * damping * theta) / scale, g2: (4 * theta ** 2) / scale, g3: 0 };
}

/**
 * Gains of order 3 whose poles at D = 0 are the bilinear image of s³ + b3·ω0·s² + a3·ω0²·s + ω0³, θ = ω0Tu/2.
 * With s = (2/Tu)·w/(2 + w) the polynomial becomes, over w, w³ + c2·w² + c1·w + c0; then g3 = c0, g2 = c1 − 2c0 and
 * g1 = c2 − c1 + c0, written here without the differences.
 *
 * g2 is above 0 for θ below a3. Every stable form of nominal bandwidth Bn·Tu up to 0.5 keeps that: with q = a3·b3 − 1 the
 * widest θ over a3 is q/(q² + q + a3³).
 *
 * @see E. Kaplan, C. Hegarty, "Understanding GPS", loop filter table (a3, b3)
 */
export function thirdOrderGains(theta: number, { a3, b3 }: ThirdOrderForm = publishedForm): LoopGains {
  requirePositive({ theta });
  const scale = 1 + b3 * theta + a3 * theta ** 2 + theta ** 3;
  return {
    g1: (2 * b3 * theta + 2 * theta ** 3) / scale,
    g2: (4 * a3 * theta ** 2 - 4 * theta ** 3) / scale,
    g3: (8 * theta ** 3) / scale,
  };
}

/** Nominal noise bandwidth Bn·Tu over the free frequency times Tu: K, ωn or ω0 by the order. */
export function bandwidthOverOmega(order: number, damping: number, form: ThirdOrderForm = publishedForm): number {
  if (order === 1) return 1 / 4;
  return order === 2 ? (damping + 1 / (4 * damping)) / 2 : thirdOrderBandwidth(form);
}

/** θ of a free frequency ω·Tu, pre-warped or not. */
export function thetaOf(omegaTu: number, prewarp: boolean): number {
  if (!prewarp) return omegaTu / 2;
  if (omegaTu >= Math.PI)
    throw new ParameterError('omegaTu', 'a pre-warped frequency must lie below half the update rate');
  return Math.tan(omegaTu / 2);
}

/** Nominal gains of an order at θ. */
export function nominalGains(
  order: number,
  { damping, theta, form }: SecondOrderPlacement & { form?: ThirdOrderForm | undefined },
): LoopGains {
  if (order === 1) return firstOrderGains(theta);
  return order === 2 ? secondOrderGains({ damping, theta }) : thirdOrderGains(theta, form);
}
