import erfc from '@stdlib/math-base-special-erfc';
import { describe, expect, it } from 'vitest';
import { implementationLoss } from '../../../shared/budget/implementation-loss';
import { errorRateOf } from '../../../shared/detectors/symbol-error-rate';
import { gaussians } from './noise';

const degrees = Math.PI / 180;
const bpsk = (esN0: number, phase: number): number => erfc(Math.sqrt(esN0) * Math.cos(phase)) / 2;
const lossOf = (esN0: number, deviation: number, bias = 0, errorRate = bpsk) =>
  implementationLoss({ errorRate, esN0, variance: (deviation * degrees) ** 2, bias: bias * degrees });

describe('implementationLoss', () => {
  // Published: a static phase error of 10° costs BPSK 0.133 dB, −20·log10 cos 10°, at any Es/N0.
  it.each([0.5, 4, 10, 40])('is 0.133 dB for BPSK with 10° of standing error, γ = %f', (esN0) => {
    expect(lossOf(esN0, 0, 10).lossDb).toBeCloseTo(0.133, 3);
    expect(lossOf(esN0, 0, 10).lossDb).toBeCloseTo(-20 * Math.log10(Math.cos(10 * degrees)), 7);
  });

  it('is nothing without jitter', () => {
    expect(lossOf(10, 0).lossDb).toBeCloseTo(0, 9);
    expect(lossOf(10, 0).symbolErrorRate).toBeCloseTo(lossOf(10, 0).idealSymbolErrorRate, 15);
  });

  // A brute-force mean over a fine midpoint grid of 40 deviations to either side, and a search by bisection, in this file.
  it.each([
    [10, 5, 0],
    [10, 15, 0],
    [10, 5, 8],
    [100, 5, 0],
    [400, 8, 3],
    [1, 20, 0],
  ])('matches a fine sum and a bisection: γ = %f, %f° rms, %f° standing', (esN0, deviation, bias) => {
    const qpsk = (gamma: number, phase: number): number => {
      const rail = (angle: number): number => erfc(Math.sqrt(gamma) * Math.cos(angle)) / 2;
      const [one, other] = [rail(phase + Math.PI / 4), rail(phase - Math.PI / 4)];
      return one + other - one * other;
    };
    let [sum, weights] = [0, 0];
    for (let i = -40_000; i <= 40_000; i += 1) {
      const x = i / 1000;
      const weight = Math.exp((-x * x) / 2);
      sum += weight * qpsk(esN0, (bias + deviation * x) * degrees);
      weights += weight;
    }
    let [low, high] = [1e-3, esN0];
    for (let round = 0; round < 100; round += 1) {
      const middle = Math.sqrt(low * high);
      if (qpsk(middle, 0) > sum / weights) low = middle;
      else high = middle;
    }
    const found = lossOf(esN0, deviation, bias, errorRateOf('QPSK'));
    expect(found.symbolErrorRate / (sum / weights)).toBeCloseTo(1, 4);
    expect(found.lossDb).toBeCloseTo(10 * Math.log10(esN0 / low), 4);
  });

  // A seeded simulation of QPSK decisions in this file, 2 % (three deviations).
  it('is the error rate of decisions with a jittering phase', () => {
    const noise = gaussians(5);
    const [esN0, deviation, symbols] = [5, 10 * degrees, 1_000_000];
    let errors = 0;
    for (let k = 0; k < symbols; k += 1) {
      const angle = Math.PI / 4 + deviation * noise();
      const rail = (mean: number): number => mean + noise() / Math.sqrt(2 * esN0);
      if (rail(Math.cos(angle)) < 0 || rail(Math.sin(angle)) < 0) errors += 1;
    }
    const { symbolErrorRate } = lossOf(esN0, 10, 0, errorRateOf('QPSK'));
    expect(Math.abs(symbolErrorRate / (errors / symbols) - 1)).toBeLessThan(0.02);
  });

  it('gives none where no Es/N0 is so bad, or where no error ever comes', () => {
    expect(lossOf(10, 0, 100).lossDb).toBeNull();
    expect(lossOf(1e4, 0.1)).toMatchObject({ lossDb: null, idealSymbolErrorRate: 0 });
  });
});
