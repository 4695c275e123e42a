import { describe, expect, it } from 'vitest';
import { oscillatorVariance, phaseNoiseDensity, phaseNoiseGrid } from '../../../shared/budget/phase-noise';
import { nominalGains, secondOrderGains } from '../../../shared/loop/gains';
import { linearLoop } from '../../../shared/loop/linear-loop';
import { broadcastMask } from '../sample-plan';

const nominal = (bandwidth: number, delay = 0) =>
  linearLoop({
    gains: secondOrderGains({ damping: Math.SQRT1_2, theta: bandwidth / (1.5 * Math.SQRT1_2) }),
    delay,
    averaged: 1,
  });

const degreesRms = (variance: number | null): number => (180 / Math.PI) * Math.sqrt(variance as number);

describe('phaseNoiseDensity', () => {
  it('is 2·10^(L/10), straight between points over log f', () => {
    expect(phaseNoiseDensity(broadcastMask, 1e3)).toBeCloseTo(2e-5, 12);
    expect(10 * Math.log10(phaseNoiseDensity(broadcastMask, Math.sqrt(1e3 * 1e4)) / 2)).toBeCloseTo(-61.5, 9);
  });

  it('rises by 30 dB a decade below the table and is flat above it', () => {
    expect(10 * Math.log10(phaseNoiseDensity(broadcastMask, 10) / 2)).toBeCloseTo(5, 9);
    expect(10 * Math.log10(phaseNoiseDensity(broadcastMask, 1e9) / 2)).toBeCloseTo(-114, 9);
  });
});

describe('oscillatorVariance', () => {
  // The mask through ζ = 1/√2 at 20 MBd (ETSI EN 302 307-1 annex, memory; values derived), ±1 %.
  it.each([
    [0.001, 2.79],
    [0.002, 2.06],
    [0.005, 1.54],
    [0.01, 1.33],
  ])('leaves BnT = %f a jitter of %f°', (bandwidth, degrees) => {
    const loop = nominal(bandwidth);
    const grid = phaseNoiseGrid(broadcastMask, loop, 1e-3, 20e6);
    expect(Math.abs(degreesRms(oscillatorVariance(loop, grid)) / degrees - 1)).toBeLessThan(0.01);
  });

  // Derived: S = Δν/(π f²), a random walk of line width Δν, leaves 2πΔνT · 2/(g1·(4 − 2g1 − g2)).
  it('matches the closed form of random-walk phase noise', () => {
    const loop = nominal(0.02);
    const { g1, g2 } = loop.gains;
    const [lineWidth, rate] = [100, 1e6];
    const level = (f: number): number => 10 * Math.log10(lineWidth / (Math.PI * f * f) / 2);
    const table = [1e-3, 1, 1e3, 1e6].map((f): [number, number] => [f, level(f)]);
    const grid = phaseNoiseGrid(table, loop, 1e-2, rate);
    const closed = ((2 * Math.PI * lineWidth) / rate) * (2 / (g1 * (4 - 2 * g1 - g2)));
    // The walk of the closed form is sampled: its aliases add a little that a density up to half the rate has not.
    expect(Math.abs((oscillatorVariance(loop, grid) as number) / closed - 1)).toBeLessThan(0.03);
  });

  it('has no finite value for order 1', () => {
    const loop = linearLoop({ gains: nominalGains(1, { damping: 1, theta: 0.01 }), delay: 0, averaged: 1 });
    expect(oscillatorVariance(loop, phaseNoiseGrid(broadcastMask, loop, 1e-3, 1e6))).toBeNull();
  });
});
