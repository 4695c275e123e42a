import type { LinearLoop } from '../../../shared/loop/linear-loop';

/**
 * Impulse response of the closed loop by its difference equations, sample after sample: an independent way to what
 * the product works out from polynomials.
 */
export const impulseResponse = (loop: LinearLoop, length: number): number[] =>
  phaseAfter(loop, length, (k) => (k === 0 ? 1 : 0));

/** Error θ − θ̂ after an input phase θ[k]. */
export function errorAfter(loop: LinearLoop, length: number, input: (k: number) => number): number[] {
  return phaseAfter(loop, length, input).map((phase, k) => input(k) - phase);
}

function phaseAfter({ gains, delay, averaged }: LinearLoop, length: number, input: (k: number) => number): number[] {
  const phase = new Array<number>(length).fill(0);
  const control = new Array<number>(length).fill(0);
  const weight = (averaged + 1) / (2 * averaged);
  let [first, second, before] = [0, 0, 0];
  for (let k = 0; k + 1 < length; k += 1) {
    const error = input(k) - phase[k]!;
    const mean = weight * error + (1 - weight) * before;
    before = error;
    second += gains.g3 * mean;
    first += gains.g2 * mean + second;
    control[k] = gains.g1 * mean + first;
    phase[k + 1] = phase[k]! + (k >= delay ? control[k - delay]! : 0);
  }
  return phase;
}

/** ½ Σ h², smallest terms first. */
export const summedBandwidth = (loop: LinearLoop, length: number): number =>
  impulseResponse(loop, length).reduceRight((sum, value) => sum + value * value, 0) / 2;
