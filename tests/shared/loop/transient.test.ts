import { describe, expect, it } from 'vitest';
import { nominalGains } from '../../../shared/loop/gains';
import { linearLoop } from '../../../shared/loop/linear-loop';
import type { LinearLoop } from '../../../shared/loop/linear-loop';
import { modalErrors } from '../../../shared/loop/modal-errors';
import { closedLoopPoles } from '../../../shared/loop/poles';
import { transientOf } from '../../../shared/loop/transient';
import { errorAfter } from './brute-force';

const looped = (
  order: number,
  bandwidth: number,
  { damping = Math.SQRT1_2, delay = 0, averaged = 1 } = {},
): LinearLoop =>
  linearLoop({
    gains: nominalGains(order, { damping, theta: order === 2 ? bandwidth / (damping + 1 / (4 * damping)) : bandwidth }),
    delay,
    averaged,
  });
const transient = (loop: LinearLoop) => transientOf(loop, closedLoopPoles(loop))!;

/** Inputs whose error responses the engine names: a phase step, k, and k(k + 1)/2. */
const inputs = { step: () => 1, frequency: (k: number) => k, ramp: (k: number) => (k * (k + 1)) / 2 };

// Independent: the difference equations of the loop, update by update.
describe('transientOf', () => {
  it.each([
    [2, 0.01, { delay: 3 }],
    [2, 0.004, { delay: 20, averaged: 8 }],
    [2, 0.02, { damping: 0.3, delay: 5 }],
    [1, 0.01, { delay: 2 }],
    [3, 0.01, { delay: 4 }],
    // Slower than what is simulated: from the poles.
    [2, 2e-4, { delay: 3 }],
    [2, 1e-4, { damping: 1 }],
    [3, 2e-4, { delay: 30 }],
    [1, 5e-5, {}],
  ])('settles, overshoots and peaks like the simulated loop: order %i, BnT %f, %o', (order, bandwidth, parts) => {
    const loop = looped(order, bandwidth, parts);
    const result = transient(loop);
    const length = result.phaseStep.updates.at(-1)! + 1;
    const step = errorAfter(loop, length, inputs.step);
    expect(result.settlingUpdates).toBe(step.findLastIndex((value) => Math.abs(value) > 0.02) + 1);
    expect(result.overshoot).toBeCloseTo(Math.max(0, -step.reduce((least, value) => Math.min(least, value))), 8);
    for (const [key, input] of [
      ['frequencyStep', inputs.frequency],
      ['frequencyRamp', inputs.ramp],
    ] as const) {
      const error = errorAfter(loop, length, input);
      const top = error.reduce((most, value) => Math.max(most, Math.abs(value)), 0);
      expect(result[key].peak / top).toBeCloseTo(1, 7);
      result[key].updates.forEach((k, i) => expect((result[key].value[i]! - error[k]!) / top).toBeCloseTo(0, 7));
    }
  });

  // Published (F. Gardner, Phaselock Techniques): a ramp of R leaves R/g2, nothing at order 3, and a frequency step of order 1 leaves Δω/g1.
  it('ends where the integrators leave it', () => {
    const { g1 } = looped(1, 0.01).gains;
    const { g2 } = looped(2, 0.01).gains;
    expect(transient(looped(1, 0.01)).frequencyStep).toMatchObject({ settled: 1 / g1 });
    expect(transient(looped(1, 0.01)).frequencyRamp.settled).toBeNull();
    expect(transient(looped(2, 0.01)).frequencyStep.settled).toBe(0);
    expect(transient(looped(2, 0.01)).frequencyRamp.settled).toBe(1 / g2);
    expect(transient(looped(2, 0.01)).frequencyRamp.value.at(-1)! * g2).toBeCloseTo(1, 2);
    expect(transient(looped(3, 0.01)).frequencyRamp.settled).toBe(0);
  });

  // Analog type-2 loop, ζ = 1/√2: y = 1 − e^(−x)(cos x − sin x) at x = ωn·t/√2 peaks at x = π/2 with e^(−π/2); after a
  // frequency step the error Δω/ωn·√2·e^(−x)·sin x peaks at x = π/4 with e^(−π/4) (derived).
  it('is that of the analog loop when it is slow', () => {
    const loop = looped(2, 1e-6);
    const omegaTu = Math.sqrt(loop.gains.g2);
    const result = transient(loop);
    expect(result.overshoot).toBeCloseTo(Math.exp(-Math.PI / 2), 5);
    expect(result.frequencyStep.peak * omegaTu).toBeCloseTo(Math.exp(-Math.PI / 4), 5);
    expect((result.frequencyStep.peakUpdates * omegaTu * Math.SQRT2) / (Math.PI / 2)).toBeCloseTo(1, 2);
  });

  it('draws rising updates from 0 beyond settling, with the peak among them', () => {
    const { phaseStep, settlingUpdates, frequencyStep } = transient(looped(2, 0.01, { delay: 3 }));
    expect(phaseStep.updates[0]).toBe(0);
    expect(phaseStep.updates.at(-1)).toBeGreaterThan(settlingUpdates);
    expect(new Set(phaseStep.updates).size).toBe(phaseStep.updates.length);
    expect(phaseStep.phase.at(-1)).toBeCloseTo(1, 1);
    expect(frequencyStep.value[frequencyStep.updates.indexOf(frequencyStep.peakUpdates)]).toBe(frequencyStep.peak);
  });
});

describe('modalErrors', () => {
  // Independent: difference equations. ζ = 1 without delay is a double pole.
  it.each([
    [1, 0.01, {}],
    [1, 0.02, { delay: 7, averaged: 4 }],
    [2, 0.01, { damping: 1 }],
    [2, 0.05, { damping: 3, delay: 2 }],
    [2, 0.005, { damping: 0.3, delay: 64 }],
    [3, 0.01, { delay: 10, averaged: 64 }],
  ])('agree with the simulated loop: order %i, BnT %f, %o', (order, bandwidth, parts) => {
    const loop = looped(order, bandwidth, parts);
    const modal = modalErrors(loop, closedLoopPoles(loop));
    for (const key of ['step', 'frequency', 'ramp'] as const) {
      const error = errorAfter(loop, 800, inputs[key]);
      const top = Math.max(...error.map(Math.abs));
      error.forEach((value, k) => expect((modal[key](k) - value) / top).toBeCloseTo(0, 7));
    }
  });
});
