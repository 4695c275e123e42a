import type { LinearLoop } from './linear-loop';

export interface StepResponse {
  /** Updates after which the oscillator phase stays within 2 % of a unit phase step. */
  settlingUpdates: number;
  /** Overshoot over 1. */
  overshoot: number;
  /** Oscillator phase at update 0, 1, 2 … */
  phase: Float64Array;
}

const settlingBand = 0.02;
/** Beyond this many updates the response is not simulated: it would hold up an answer while somebody types. */
const longest = 1_000_000;

/**
 * Response of the oscillator phase to a unit phase step, run update by update.
 *
 * @param slowestPole largest modulus of the closed-loop poles, below 1
 * @returns null when the slowest pole would need more than a million updates
 */
export function stepResponse(loop: LinearLoop, slowestPole: number): StepResponse | null {
  const decay = -Math.log(slowestPole);
  const updates = Math.ceil(8 / decay) + 4 * (loop.delay + 4);
  if (!(updates <= longest)) return null;
  const phase = simulate(loop, updates);
  let settlingUpdates = 0;
  let peak = 1;
  for (let k = 0; k < phase.length; k += 1) {
    const value = phase[k] as number;
    if (Math.abs(value - 1) > settlingBand) settlingUpdates = k + 1;
    if (value > peak) peak = value;
  }
  return { settlingUpdates, overshoot: peak - 1, phase };
}

/** θ̂[k+1] = θ̂[k] + v[k−D], v the filtered error; where errors are averaged, A(z) weighs this one and the last. */
function simulate({ gains: { g1, g2, g3 }, delay, averaged }: LinearLoop, updates: number): Float64Array {
  const phase = new Float64Array(updates);
  const controls = new Float64Array(updates);
  const weight = (averaged + 1) / (2 * averaged);
  let [rate, ramp, before] = [0, 0, 0];
  for (let k = 0; k < updates - 1; k += 1) {
    const error = 1 - (phase[k] as number);
    const averagedError = weight * error + (1 - weight) * before;
    before = error;
    ramp += g3 * averagedError;
    rate += g2 * averagedError + ramp;
    controls[k] = g1 * averagedError + rate;
    phase[k + 1] = (phase[k] as number) + (k >= delay ? (controls[k - delay] as number) : 0);
  }
  return phase;
}
