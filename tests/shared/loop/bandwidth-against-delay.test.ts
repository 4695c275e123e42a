import { describe, expect, it } from 'vitest';
import { bandwidthAgainstDelay } from '../../../shared/loop/bandwidth-against-delay';
import { nominalGains } from '../../../shared/loop/gains';
import { linearLoop } from '../../../shared/loop/linear-loop';
import { stabilityLimits } from '../../../shared/loop/margins';
import { swiftNoiseBandwidth } from '../../../shared/loop/swift-noise-bandwidth';
import { summedBandwidth } from './brute-force';

const loopOf = (bandwidth: number, delay: number, averaged = 1, order = 2) =>
  linearLoop({
    gains: nominalGains(order, { damping: Math.SQRT1_2, theta: bandwidth / (1.5 * Math.SQRT1_2) }),
    delay,
    averaged,
  });
const against = (bandwidth: number, delay: number, updateInterval = 1) => {
  const loop = loopOf(bandwidth, delay, updateInterval);
  return bandwidthAgainstDelay(loop, stabilityLimits(loop).largestDelay, updateInterval);
};

describe('bandwidthAgainstDelay', () => {
  // Derived: wanted 0.05 with D = 5 has 0.165; stable to 7 updates.
  it('rises with the delay until the loop is unstable', () => {
    const { delay, noiseBandwidth } = against(0.05, 0);
    expect(noiseBandwidth[delay.indexOf(5)]).toBeCloseTo(0.165, 3);
    expect(delay.at(-1)).toBe(8);
    expect(noiseBandwidth.at(-1)).toBeNull();
    expect(noiseBandwidth[delay.indexOf(0)]).toBeCloseTo(0.05225926, 8);
  });

  // Independent: half the sum of the squared impulse response.
  it('is half the energy of the impulse response, per symbol', () => {
    const { delay, noiseBandwidth } = against(0.01, 3, 4);
    delay.forEach((d, i) => {
      if (d > 30) return;
      expect(noiseBandwidth[i]! / (summedBandwidth(loopOf(0.01, d, 4), 60_000) / 4)).toBeCloseTo(1, 7);
    });
    expect(delay).toContain(3);
  });

  it('says null at the own delay of a loop that no delay leaves stable', () => {
    const loop = { ...loopOf(0.01, 2), gains: { g1: 5, g2: 1, g3: 0 } };
    const { noiseBandwidth } = bandwidthAgainstDelay(loop, stabilityLimits(loop).largestDelay, 1);
    expect(noiseBandwidth.every((value) => value === null)).toBe(true);
  });
});

describe('swiftNoiseBandwidth', () => {
  // Independent: the impulse response, orders 1 to 3, averaged or not.
  it.each([
    [1, 0.01, 5, 1],
    [2, 0.02, 12, 8],
    [3, 0.01, 20, 1],
    [2, 0.002, 64, 1],
  ])('is half the energy of the impulse response: order %i, θ %f, D = %i, U = %i', (order, theta, delay, averaged) => {
    const loop = loopOf(theta, delay, averaged, order);
    expect(swiftNoiseBandwidth(loop)! / summedBandwidth(loop, 60_000)).toBeCloseTo(1, 7);
  });

  it('is null for an unstable loop', () => {
    expect(swiftNoiseBandwidth(loopOf(0.05, 8))).toBeNull();
  });
});
