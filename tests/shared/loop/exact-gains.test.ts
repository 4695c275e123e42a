import { describe, expect, it } from 'vitest';
import { dominantDamping } from '../../../shared/loop/dominant-pair';
import { exactLoop, placedLoop } from '../../../shared/loop/exact-gains';
import { noiseBandwidth } from '../../../shared/loop/noise-bandwidth';
import { summedBandwidth } from './brute-force';

const shape = (delay: number, damping = Math.SQRT1_2, averaged = 1) => ({ order: 2, damping, delay, averaged });

describe('exactLoop', () => {
  // Derived, by solving for bandwidth and damping together with a general equation solver.
  it.each([
    [0, Math.SQRT1_2, 0.05, 0.1198956784, 0.007661448591],
    [0, 1, 0.02, 0.0612473994, 0.000967678995],
    [1, Math.SQRT1_2, 0.02, 0.0482654, 0.0011939],
    [3, Math.SQRT1_2, 0.02, 0.0436517, 0.00097382],
    [6, Math.SQRT1_2, 0.02, 0.0383723, 0.00074891],
  ])('hits the tables at D = %i, ζ = %f, BnT = %f', (delay, damping, bandwidth, g1, g2) => {
    const { gains } = exactLoop(shape(delay, damping), bandwidth).loop;
    expect(Math.abs(gains.g1 / g1 - 1)).toBeLessThan(2e-6);
    expect(Math.abs(gains.g2 / g2 - 1)).toBeLessThan(1e-5);
  });

  it.each([
    [0, 1e-5, Math.SQRT1_2, 1],
    [64, 1e-5, Math.SQRT1_2, 1],
    [64, 0.004, Math.SQRT1_2, 1],
    [3, 0.01, 1, 1],
    [10, 0.01, 3, 1],
    [5, 0.02, 0.3, 4],
  ])(
    'has the wanted bandwidth and damping to 1e-9 at D = %i, BnT = %f, ζ = %f, U = %i',
    (delay, bandwidth, damping, averaged) => {
      const { loop } = exactLoop(shape(delay, damping, averaged), bandwidth);
      expect(Math.abs((noiseBandwidth(loop) as number) / bandwidth - 1)).toBeLessThan(1e-9);
      expect(Math.abs(dominantDamping(loop)!.damping / damping - 1)).toBeLessThan(1e-9);
    },
  );

  it('really has that bandwidth, sample after sample', () => {
    const { loop } = exactLoop(shape(3), 0.01);
    expect(Math.abs(summedBandwidth(loop, 8000) / 0.01 - 1)).toBeLessThan(1e-9);
  });

  it.each([1, 3])('scales the one frequency of order %i', (order) => {
    const { loop } = exactLoop({ order, damping: 1, delay: 4, averaged: 1 }, 0.01);
    expect(Math.abs(summedBandwidth(loop, 8000) / 0.01 - 1)).toBeLessThan(1e-9);
  });

  // Derived: at ζ = 1/√2 the widest bandwidth times the delay is about 0.28 / 0.33 / 0.36 / 0.38 (±5 %).
  it.each([
    [1, 0.28],
    [3, 0.33],
    [6, 0.36],
    [12, 0.38],
  ])('says how wide D = %i can go', (delay, product) => {
    const refused = (): unknown => exactLoop(shape(delay), 0.45);
    expect(refused).toThrow(expect.objectContaining({ parameter: 'noiseBandwidth' }));
    try {
      refused();
    } catch (error) {
      const widest = (error as { widestBandwidth: number }).widestBandwidth;
      expect(Math.abs((delay * widest) / product - 1)).toBeLessThan(0.05);
      expect(noiseBandwidth(exactLoop(shape(delay), 0.999 * widest).loop)).toBeCloseTo(0.999 * widest, 8);
    }
  });
});

describe('placedLoop', () => {
  it('is the nominal loop when there is no delay', () => {
    const { gains } = placedLoop(shape(0), 0.01 / (1.5 * Math.SQRT1_2))!;
    expect(gains.g1).toBeCloseTo(300 / 11401, 15);
    expect(gains.g2).toBeCloseTo(4 / 11401, 16);
  });

  it('does not place a pair that is not the one of D = 0', () => {
    expect(placedLoop(shape(3), 0.3)).toBeNull();
  });
});
