import { describe, expect, it } from 'vitest';
import { firstOrderGains, secondOrderGains, thetaOf, thirdOrderGains } from '../../../shared/loop/gains';
import { linearLoop } from '../../../shared/loop/linear-loop';
import { noiseBandwidth } from '../../../shared/loop/noise-bandwidth';

const theta = (bandwidth: number, damping: number): number => bandwidth / (damping + 1 / (4 * damping));

describe('secondOrderGains', () => {
  // By hand in exact fractions: ζ = 1/√2 and BnT = 1/100 give 2ζθ = 1/75 and θ² = 1/11250.
  it('gives the fractions of ζ = 1/√2, BnT = 0.01', () => {
    const { g1, g2 } = secondOrderGains({ damping: Math.SQRT1_2, theta: theta(0.01, Math.SQRT1_2) });
    expect(g1 / (300 / 11401) - 1).toBeCloseTo(0, 12);
    expect(g2 / (4 / 11401) - 1).toBeCloseTo(0, 12);
  });

  // Derived from M. Rice 2009, eq. C.57, in exact arithmetic; twelve digits.
  it.each([
    [0.5, 0.01, 0.0198000198, 0.000396000396],
    [Math.SQRT1_2, 0.05, 0.12474012474, 0.008316008316],
    [Math.SQRT1_2, 0.1, 0.233463035019, 0.031128404669],
    [1, 0.02, 0.062000124, 0.000992001984],
    [2, 0.01, 0.036950697988, 0.000086942819],
  ])('matches the published formula at ζ = %f, BnT = %f', (damping, bandwidth, g1, g2) => {
    const gains = secondOrderGains({ damping, theta: theta(bandwidth, damping) });
    expect(gains.g1).toBeCloseTo(g1, 12);
    expect(gains.g2).toBeCloseTo(g2, 12);
  });

  it.each([0, -1, NaN, Infinity])('names the parameter that is %f', (damping) => {
    const fault = expect.objectContaining({ parameter: 'damping' });
    expect(() => secondOrderGains({ damping, theta: 0.01 })).toThrow(fault);
  });
});

describe('firstOrderGains', () => {
  // Derived: BnT = g1/(2(2 − g1)) of the loop with pole 1 − g1.
  it('has the closed-form bandwidth', () => {
    const gains = firstOrderGains(0.05);
    const loop = linearLoop({ gains, delay: 0, averaged: 1 });
    expect(noiseBandwidth(loop)).toBeCloseTo(gains.g1 / (2 * (2 - gains.g1)), 14);
  });
});

describe('thirdOrderGains', () => {
  // By hand: (1 + b3θ + a3θ² + θ³)·w³ + (2b3θ + 4a3θ² + 6θ³)·w² + (4a3θ² + 12θ³)·w + 8θ³ at θ = 0.1 is
  // 1.252·w³ + 0.53·w² + 0.056·w + 0.008.
  it('expands to the bilinear image of the analog form', () => {
    const { g1, g2, g3 } = thirdOrderGains(0.1);
    expect(g3).toBeCloseTo(0.008 / 1.252, 14);
    expect(g2 + 2 * g3).toBeCloseTo(0.056 / 1.252, 14);
    expect(g1 + g2 + g3).toBeCloseTo(0.53 / 1.252, 14);
  });

  // E. Kaplan, C. Hegarty, Understanding GPS, loop filter table: Bn = 0.7845 ω0.
  it('has Bn = 0.7845 ω0 when it is slow', () => {
    const loop = linearLoop({ gains: thirdOrderGains(5e-5), delay: 0, averaged: 1 });
    expect((noiseBandwidth(loop) as number) / 1e-4).toBeCloseTo(0.7845, 3);
  });
});

describe('thetaOf', () => {
  it('is half the frequency, or its tangent', () => {
    expect(thetaOf(0.2, false)).toBe(0.1);
    expect(thetaOf(Math.PI / 2, true)).toBeCloseTo(1, 14);
  });
});
