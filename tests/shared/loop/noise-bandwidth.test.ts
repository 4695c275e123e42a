import { describe, expect, it } from 'vitest';
import { nominalGains, secondOrderGains } from '../../../shared/loop/gains';
import { linearLoop } from '../../../shared/loop/linear-loop';
import { isStable, noiseBandwidth } from '../../../shared/loop/noise-bandwidth';
import { summedBandwidth } from './brute-force';

const nominal = (damping: number, bandwidth: number, delay = 0, averaged = 1) => {
  const theta = bandwidth / (damping + 1 / (4 * damping));
  return linearLoop({ gains: secondOrderGains({ damping, theta }), delay, averaged });
};

describe('noiseBandwidth', () => {
  // Derived: for D = 0, 2·BnT = (2g1² + 2g2 + g1·g2)/(g1·(4 − 2g1 − g2)).
  it.each([
    [0.5, 0.01, 0.0101005],
    [Math.SQRT1_2, 0.01, 0.01008919],
    [Math.SQRT1_2, 0.05, 0.05225926],
    [Math.SQRT1_2, 0.1, 0.10918519],
    [1, 0.02, 0.020257024],
    [2, 0.01, 0.01002216],
  ])('matches the tables at ζ = %f, BnT = %f', (damping, bandwidth, exact) => {
    expect(noiseBandwidth(nominal(damping, bandwidth))).toBeCloseTo(exact, 8);
  });

  // Derived: these gains have BnT + θ² + θ³/(4ζ), which does not cancel, however slow the loop is.
  it.each([1e-6, 1e-5, 1e-4, 3e-4, 1e-2, 0.3])('keeps its digits at BnT = %f', (bandwidth) => {
    for (const damping of [0.1, Math.SQRT1_2, 1, 5]) {
      const theta = bandwidth / (damping + 1 / (4 * damping));
      const expected = bandwidth + theta ** 2 + theta ** 3 / (4 * damping);
      expect(Math.abs((noiseBandwidth(nominal(damping, bandwidth)) as number) / expected - 1)).toBeLessThan(1e-12);
    }
  });

  // Independent: the difference equations run sample after sample.
  it.each([
    [0.01, 3, 1],
    [0.004, 3, 1],
    [0.02, 10, 1],
    [0.004, 64, 1],
    [0.001, 64, 8],
    [0.05, 2, 64],
  ])('agrees with the summed impulse response at BnT = %f, D = %i, U = %i', (bandwidth, delay, averaged) => {
    const loop = nominal(0.6, bandwidth, delay, averaged);
    expect(Math.abs((noiseBandwidth(loop) as number) / summedBandwidth(loop, 60_000) - 1)).toBeLessThan(1e-9);
  });

  it.each([1, 3])('agrees with the summed impulse response at order %i', (order) => {
    const loop = linearLoop({ gains: nominalGains(order, { damping: 1, theta: 0.01 }), delay: 5, averaged: 1 });
    expect(Math.abs((noiseBandwidth(loop) as number) / summedBandwidth(loop, 20_000) - 1)).toBeLessThan(1e-9);
  });

  // Derived: wanted 0.05 with five updates of delay is over three times too wide.
  it('grows with the delay', () => {
    expect(noiseBandwidth(nominal(Math.SQRT1_2, 0.05, 5))).toBeCloseTo(0.1653, 4);
  });

  // Derived: an average of U errors adds up to half an update of delay.
  it.each([
    [1, 0.0522],
    [4, 0.0532],
    [8, 0.0537],
    [64, 0.0541],
  ])('averaging %i symbols takes a wanted 0.05 to %f', (averaged, exact) => {
    expect(Math.abs((noiseBandwidth(nominal(Math.SQRT1_2, 0.05, 0, averaged)) as number) - exact)).toBeLessThan(1e-4);
  });

  it('has none for an unstable loop, or one without gain', () => {
    expect(noiseBandwidth(nominal(Math.SQRT1_2, 0.05, 12))).toBeNull();
    expect(noiseBandwidth(linearLoop({ gains: { g1: 0, g2: 0, g3: 0 }, delay: 0, averaged: 1 }))).toBeNull();
  });
});

describe('isStable', () => {
  // Jury: g1 > 0, g2 > 0, 2·g1 + g2 < 4.
  it.each([
    [1.9, 0.19, true],
    [1.9, 0.21, false],
    [0.001, 3.99, true],
    [0.001, 3.999, false],
  ])('knows the triangle of order 2: g1 = %f, g2 = %f', (g1, g2, stable) => {
    expect(isStable(linearLoop({ gains: { g1, g2, g3: 0 }, delay: 0, averaged: 1 }))).toBe(stable);
  });
});
