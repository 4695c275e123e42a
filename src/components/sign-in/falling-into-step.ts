import { secondOrderGains } from '../../../shared/loop/gains';

export const updates = 419;

/**
 * Phase error of a second-order loop with a sinusoidal detector of unit slope, no noise, no delay, from a phase step.
 *
 *     e = sin φ,   a ← a + g2·e,   φ ← φ − (g1·e + a)
 *
 * @param start phase error before the first update, rad
 * @returns phase error before each of `updates` updates and after the last, rad
 */
export function phaseErrors(start: number, dampingRatio: number, noiseBandwidth: number): number[] {
  const theta = noiseBandwidth / (dampingRatio + 1 / (4 * dampingRatio));
  const { g1, g2 } = secondOrderGains({ damping: dampingRatio, theta });
  const errors = [start];
  let frequency = 0;
  for (let phase = start; errors.length <= updates; errors.push(phase)) {
    const error = Math.sin(phase);
    frequency += g2 * error;
    phase -= g1 * error + frequency;
  }
  return errors;
}

export interface Crest {
  /** Updates at which the carrier and the NCO stand at the same crest. */
  carrier: number;
  nco: number;
}

/** Crests of both waves in pairs: where the pairs stand upright, the loop has locked. */
export function crests(errors: readonly number[], period: number): Crest[] {
  const turns = errors.map((error, at) => at / period - error / (2 * Math.PI));
  const pairs: Crest[] = [];
  for (let turn = 0.25; turn * period < updates; turn += 1) {
    const after = turns.findIndex((each) => each >= turn);
    const [high, low] = [turns[after], turns[after - 1]];
    if (high === undefined || low === undefined) continue;
    pairs.push({ carrier: turn * period, nco: after - 1 + (turn - low) / (high - low) });
  }
  return pairs;
}
