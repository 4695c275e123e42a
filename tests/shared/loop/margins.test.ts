import { add, complex, divide, multiply, pow, subtract } from 'mathjs';
import type { Complex } from 'mathjs';
import { describe, expect, it } from 'vitest';
import { nominalGains, secondOrderGains } from '../../../shared/loop/gains';
import { linearLoop, scaledLoop } from '../../../shared/loop/linear-loop';
import {
  gainCrossings,
  openLoopPhase,
  openLoopPower,
  phaseMarginDeg,
  stabilityLimits,
} from '../../../shared/loop/margins';
import { isStable } from '../../../shared/loop/noise-bandwidth';

const nominal = (bandwidth: number, delay = 0, averaged = 1) =>
  linearLoop({
    gains: secondOrderGains({ damping: Math.SQRT1_2, theta: bandwidth / (1.5 * Math.SQRT1_2) }),
    delay,
    averaged,
  });

describe('openLoopPower and openLoopPhase', () => {
  // L(z) of its definition in mathjs, for every order, with averaging.
  it.each([1, 2, 3])('is L on the unit circle, order %i', (order) => {
    const loop = linearLoop({ gains: nominalGains(order, { damping: 0.7, theta: 0.03 }), delay: 4, averaged: 8 });
    for (const omega of [0.001, 0.05, 0.7, 2.5]) {
      const z = complex(Math.cos(omega), Math.sin(omega));
      const back = divide(1, z) as Complex;
      const integrator = divide(1, subtract(1, back)) as Complex;
      const { g1, g2, g3 } = loop.gains;
      const filter = add(g1, multiply(g2, integrator), multiply(g3, multiply(integrator, integrator))) as Complex;
      const average = add(9 / 16, multiply(7 / 16, back)) as Complex;
      const value = multiply(
        multiply(multiply(pow(back, 5) as Complex, integrator), average),
        filter,
      ) as unknown as Complex;
      const [power, phase] = [openLoopPower(loop, omega), openLoopPhase(loop, omega)];
      expect(Math.abs(power / (value.re ** 2 + value.im ** 2) - 1)).toBeLessThan(1e-9);
      expect(Math.cos(phase - Math.atan2(value.im, value.re))).toBeCloseTo(1, 9);
    }
  });
});

describe('stabilityLimits', () => {
  // Derived: nominal gains, ζ = 1/√2.
  it.each([
    [0.001, 390],
    [0.005, 77],
    [0.01, 38],
    [0.02, 19],
    [0.05, 7],
  ])('allows BnT = %f a delay of %i', (bandwidth, delay) => {
    expect(stabilityLimits(nominal(bandwidth)).largestDelay).toBe(delay);
    expect(stabilityLimits(nominal(bandwidth, 3)).largestDelay).toBe(delay);
    if (delay <= 77) {
      expect(isStable(nominal(bandwidth, delay))).toBe(true);
      expect(isStable(nominal(bandwidth, delay + 1))).toBe(false);
    }
  });

  // Derived: phase margin of BnT = 0.01 with 0, 2, 5, 10 and 20 updates of delay.
  it.each([
    [0, 64.7],
    [2, 61.4],
    [5, 56.4],
    [10, 48.0],
    [20, 31.4],
  ])('leaves a phase margin with D = %i of %f°', (delay, degrees) => {
    expect(Math.abs(stabilityLimits(nominal(0.01, delay)).margins.phaseDeg! - degrees)).toBeLessThan(0.06);
    expect(Math.abs(phaseMarginDeg(gainCrossings(nominal(0.01)), delay)! - degrees)).toBeLessThan(0.06);
  });

  // Jury: 2·g1 + g2 < 4.
  it('gives the gain margin of D = 0 in closed form', () => {
    const { gains } = nominal(0.05);
    expect(stabilityLimits(nominal(0.05)).margins.gainUp).toBeCloseTo(4 / (2 * gains.g1 + gains.g2), 10);
  });

  it.each([
    [0.01, 3, 1],
    [0.01, 4, 8],
    [0.002, 40, 1],
  ])('is unstable just beyond the gain margin at BnT = %f, D = %i, U = %i', (bandwidth, delay, averaged) => {
    const loop = nominal(bandwidth, delay, averaged);
    const { gainUp, gainDown } = stabilityLimits(loop).margins;
    expect(isStable(scaledLoop(loop, 0.9999 * gainUp!))).toBe(true);
    expect(isStable(scaledLoop(loop, 1.0001 * gainUp!))).toBe(false);
    expect(gainDown).toBeNull();
  });

  it('knows that the gain of order 3 may not fall too far', () => {
    const loop = linearLoop({ gains: nominalGains(3, { damping: 1, theta: 0.02 }), delay: 2, averaged: 1 });
    const { gainDown } = stabilityLimits(loop).margins;
    expect(isStable(scaledLoop(loop, 1.001 * gainDown!))).toBe(true);
    expect(isStable(scaledLoop(loop, 0.999 * gainDown!))).toBe(false);
  });

  it('says how far the gain of an unstable loop must fall', () => {
    const loop = nominal(0.05, 12);
    const { margins, largestGain } = stabilityLimits(loop);
    expect(margins.gainUp).toBeNull();
    expect(margins.phaseDeg).toBeLessThan(0);
    expect(isStable(scaledLoop(loop, 0.999 * largestGain!))).toBe(true);
    expect(isStable(scaledLoop(loop, 1.001 * largestGain!))).toBe(false);
  });
});
