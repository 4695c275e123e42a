import { placedLoop } from '../loop/exact-gains';
import { bandwidthOverOmega, nominalGains, thetaOf } from '../loop/gains';
import { linearLoop } from '../loop/linear-loop';
import type { LinearLoop } from '../loop/linear-loop';
import type { ThirdOrderForm } from '../loop/third-order-form';
import type { CompleteCarrier, CompleteClock } from '../plan/complete';

/** Loops that differ in their bandwidth alone. */
export interface LoopFamily {
  order: number;
  /** Damping factor; of order 2 only. */
  damping: number;
  /** Extra pipeline delay, updates. */
  delay: number;
  averaged: number;
  method: 'nominal' | 'exact';
  prewarp: boolean;
  /** Analog form of order 3. */
  form: ThirdOrderForm;
}

/**
 * The loop of a family at a nominal noise bandwidth: by the formula, or with its poles placed where the formula would
 * have them.
 *
 * @param bandwidth cycles per update
 * @returns null where the family has no such loop
 */
export function loopOfBandwidth(
  { order, damping, delay, averaged, method, prewarp, form }: LoopFamily,
  bandwidth: number,
): LinearLoop | null {
  const omegaTu = bandwidth / bandwidthOverOmega(order, damping, form);
  if (prewarp && omegaTu >= Math.PI) return null;
  const theta = thetaOf(omegaTu, prewarp);
  if (method === 'exact' && order === 2) return placedLoop({ order, damping, delay, averaged }, theta);
  const loop = linearLoop({ gains: nominalGains(order, { damping, theta, form }), delay, averaged });
  return loop.order === order ? loop : null;
}

export interface FamilyStage {
  loop: Pick<LinearLoop, 'order' | 'delay' | 'averaged'>;
  /** Null where the order has none. */
  damping: number | null;
}

/**
 * The family of one stage of a planned loop.
 *
 * @param stage what is wanted of it; its own gains do not count
 */
export const familyOf = (
  { method, prewarp, thirdOrder }: Pick<CompleteCarrier | CompleteClock, 'method' | 'prewarp' | 'thirdOrder'>,
  { loop: { order, delay, averaged }, damping }: FamilyStage,
): LoopFamily => ({ order, delay, averaged, method, prewarp, damping: damping ?? 1, form: thirdOrder });
