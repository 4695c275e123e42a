import type { Curve, PhaseStep } from '../model/design';
import type { LinearLoop } from './linear-loop';
import { modalErrors } from './modal-errors';
import type { ErrorResponses } from './modal-errors';
import { bisectWhole, largestWhole } from '../math/whole-search';

/** What a loop does after a step of its input, worked out at the updates that a plot needs. */
export interface Transient {
  /** Updates after which the oscillator phase stays within 2 % of a unit phase step. */
  settlingUpdates: number;
  /** Overshoot of the oscillator phase over 1. */
  overshoot: number;
  phaseStep: PhaseStep;
  frequencyStep: Curve;
  frequencyRamp: Curve;
}

const settlingBand = 0.02;
/** Time constants of the slowest pole that are looked at. */
const timeConstants = 8;
/** Longer responses are worked out from the poles instead of update by update. */
const longestSimulated = 8192;
const stepPoints = 161;
const errorPoints = 97;
const searchPoints = 320;

/** A response with its largest magnitude, at whole updates. */
interface Trace {
  at: (k: number) => number;
  peak: { at: number; value: number };
}

/** The three phase errors, and what is read off the first. */
interface Errors {
  step: (k: number) => number;
  frequency: Trace;
  ramp: Trace;
  settlingUpdates: number;
  overshoot: number;
}

/**
 * Responses of a stable loop to a phase step, a frequency step of one radian (symbol) per update, and a frequency
 * that rises by as much at every update.
 *
 * @param poles every closed-loop pole, the slowest first, inside the unit circle
 * @returns null when the slowest pole is so near the circle that its time constant is no number to show (2^52 updates)
 */
export function transientOf(loop: LinearLoop, poles: readonly (readonly [number, number])[]): Transient | null {
  const slowest = poles[0] as readonly [number, number];
  const decay = -0.5 * Math.log1p(2 * (slowest[0] - 1) + (slowest[0] - 1) ** 2 + slowest[1] ** 2);
  const updates = Math.ceil(timeConstants / decay) + 4 * (loop.delay + 4);
  if (!(updates < 2 ** 52)) return null;
  const errors =
    updates <= longestSimulated
      ? simulatedErrors(loop, updates)
      : summedErrors(modalErrors(loop, poles), updates, Math.abs(Math.atan2(slowest[1], slowest[0])));
  const drawn = spread(updates - 1, stepPoints);
  return {
    settlingUpdates: errors.settlingUpdates,
    overshoot: errors.overshoot,
    phaseStep: { updates: drawn, phase: drawn.map((k) => 1 - errors.step(k)) },
    frequencyStep: curve(errors.frequency, updates, loop.order > 1 ? 0 : 1 / loop.gains.g1),
    frequencyRamp: curve(errors.ramp, updates, [null, null, 1 / loop.gains.g2, 0][loop.order] ?? null),
  };
}

function curve({ at, peak }: Trace, updates: number, settled: number | null): Curve {
  const drawn = [...new Set([...spread(updates - 1, errorPoints), peak.at])].sort((a, b) => a - b);
  return { updates: drawn, value: drawn.map(at), peak: peak.value, peakUpdates: peak.at, settled };
}

/** Whole numbers from 0 to `last`, evenly spread, both ends among them. */
const spread = (last: number, count: number): number[] => [
  ...new Set(Array.from({ length: count }, (_, i) => Math.round((i * last) / (count - 1)))),
];

/** What a long response says, from its sums over the poles. */
function summedErrors({ step, frequency, ramp }: ErrorResponses, updates: number, turn: number): Errors {
  const points = searchUpdates(updates);
  const trace = (at: (k: number) => number): Trace => ({ at, peak: largestWhole((k) => Math.abs(at(k)), points) });
  return {
    step,
    frequency: trace(frequency),
    ramp: trace(ramp),
    settlingUpdates: settling(step, updates, turn),
    overshoot: Math.max(0, largestWhole((k) => -step(k), points).value),
  };
}

/** From the end backward, a sixteenth of a period of the slowest pair at a time, then update by update. */
function settling(step: (k: number) => number, updates: number, turn: number): number {
  const isInside = (k: number): boolean => Math.abs(step(k)) <= settlingBand;
  const stride = Math.max(1, Math.floor(Math.min(updates / 400, Math.PI / (8 * turn))));
  let outside = updates - 1;
  while (outside > 0 && isInside(outside)) outside -= stride;
  const from = Math.max(outside, 0);
  return bisectWhole(isInside, from, Math.min(from + stride, updates - 1));
}

/** Equal ratios: the first lobe of a long response is its largest. */
function searchUpdates(updates: number): number[] {
  const ratio = updates ** (1 / (searchPoints - 1));
  const rising = Array.from({ length: searchPoints }, (_, i) => Math.min(Math.round(ratio ** i), updates - 1));
  return [...new Set([0, ...rising])];
}

/** θ̂[k+1] = θ̂[k] + v[k−D], v the filtered error; where errors are averaged, A(z) weighs this one and the last. */
function simulatedErrors({ gains: { g1, g2, g3 }, delay, averaged }: LinearLoop, updates: number): Errors {
  const step = new Float64Array(updates);
  const controls = new Float64Array(updates);
  const weight = (averaged + 1) / (2 * averaged);
  let [rate, ramp, before, settlingUpdates, lowest] = [0, 0, 0, 0, 0];
  step[0] = 1;
  for (let k = 0; k < updates; k += 1) {
    const error = step[k] as number;
    if (error > settlingBand || error < -settlingBand) settlingUpdates = k + 1;
    if (error < lowest) lowest = error;
    const averagedError = weight * error + (1 - weight) * before;
    before = error;
    ramp += g3 * averagedError;
    rate += g2 * averagedError + ramp;
    controls[k] = g1 * averagedError + rate;
    if (k + 1 < updates) step[k + 1] = error - (k >= delay ? (controls[k - delay] as number) : 0);
  }
  const frequency = runningSum(step, 1);
  return {
    step: (k) => step[k] as number,
    frequency: traceOf(frequency),
    ramp: traceOf(runningSum(frequency, 0)),
    settlingUpdates,
    overshoot: -lowest || 0,
  };
}

/** Σ values[j] over j from 0 to k − `before`. */
function runningSum(values: Float64Array, before: number): Float64Array {
  const sums = new Float64Array(values.length);
  let sum = 0;
  for (let k = before; k < values.length; k += 1) sums[k] = sum += values[k - before] as number;
  return sums;
}

function traceOf(values: Float64Array): Trace {
  let [at, value] = [0, 0];
  for (let k = 0; k < values.length; k += 1) {
    const magnitude = Math.abs(values[k] as number);
    if (magnitude > value) [at, value] = [k, magnitude];
  }
  return { at: (k) => values[k] as number, peak: { at, value } };
}
