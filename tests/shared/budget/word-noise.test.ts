import { describe, expect, it } from 'vitest';
import { loopVariances } from '../../../shared/budget/loop-energies';
import { roundingMean, roundingOffset, roundingVariance, wordEntries } from '../../../shared/budget/word-noise';
import { secondOrderGains } from '../../../shared/loop/gains';
import { linearLoop } from '../../../shared/loop/linear-loop';
import { gaussians } from './noise';

const modes = ['floor', 'nearest', 'convergent'] as const;

/** The rounding rules of the datapath contract, on reals. */
const round = {
  floor: (x: number) => Math.floor(x),
  nearest: (x: number) => Math.floor(x + 0.5),
  convergent: (x: number) => (x - Math.floor(x) === 0.5 ? 2 * Math.round(x / 2) : Math.floor(x + 0.5)),
};

describe('rounding', () => {
  // Every value of the bits, over both parities of what is left.
  it.each(modes.flatMap((mode) => [1, 2, 5].map((shift) => [mode, shift] as const)))(
    'has the mean and variance of all its errors: %s, %i bits',
    (mode, shift) => {
      const errors = Array.from({ length: 2 ** (shift + 1) }, (_, i) => round[mode](i / 2 ** shift) - i / 2 ** shift);
      const mean = errors.reduce((sum, error) => sum + error, 0) / errors.length;
      const variance = errors.reduce((sum, error) => sum + (error - mean) ** 2, 0) / errors.length;
      expect(roundingMean(mode, shift)).toBeCloseTo(mean, 12);
      expect(roundingVariance(mode, shift)).toBeCloseTo(variance, 12);
    },
  );

  it('does nothing where no bit goes', () => {
    expect([roundingMean('floor', 0), roundingVariance('nearest', -3)]).toEqual([0, 0]);
  });
});

/**
 * A loop of order 2 whose error, words and increments are rounded to steps of their own, on noise: mean and variance of
 * its phase. What rounding adds is the difference to the same loop and noise without it.
 */
function simulated(
  gains: { g1: number; g2: number },
  lsb: { error: number; word: number; integrator: number },
  floor: boolean,
) {
  const noise = gaussians(11);
  const to = (step: number, x: number) =>
    step === 0 ? x : step * (floor ? Math.floor(x / step) : Math.round(x / step));
  let [phase, acc, plain, plainAcc, sum, square] = [0, 0, 0, 0, 0, 0];
  const symbols = 2e6;
  for (let k = 0; k < symbols; k += 1) {
    const n = 0.3 * noise();
    const error = to(lsb.error, n - phase);
    acc += to(lsb.integrator, gains.g2 * error);
    phase += to(lsb.word, gains.g1 * error) + acc;
    plainAcc += gains.g2 * (n - plain);
    plain += gains.g1 * (n - plain) + plainAcc;
    sum += phase - plain;
    square += (phase - plain) ** 2;
  }
  const mean = sum / symbols;
  return { mean, variance: square / symbols - mean ** 2 };
}

describe('what rounding leaves on the phase', () => {
  const gains = { ...secondOrderGains({ damping: Math.SQRT1_2, theta: 0.02 }), g3: 0 };
  const loop = linearLoop({ gains, delay: 0, averaged: 1 });
  const none = { error: 0, word: 0, integrator: 0, integrator2: 0, errorMean: 0, lastMean: 0 };
  const third = 1 / 12;

  // A seeded simulation in this file, the loop run with and without rounding on the same noise: within 5 %.
  it.each([
    ['the error', { error: 0.25, word: 0, integrator: 0 }],
    ['the word', { error: 0, word: 0.01, integrator: 0 }],
    ['the integrator', { error: 0, word: 0, integrator: 4e-4 }],
    ['all of them', { error: 0.05, word: 0.03, integrator: 1e-3 }],
  ])('is the sum of white noises: %s', (_name, lsb) => {
    const noise = {
      ...none,
      error: third * lsb.error ** 2,
      word: third * lsb.word ** 2,
      integrator: third * lsb.integrator ** 2,
    };
    const expected = loopVariances(loop, wordEntries(noise, 2))!.reduce((sum, value) => sum + value, 0);
    expect(Math.abs(simulated(gains, lsb, false).variance / expected - 1)).toBeLessThan(0.05);
  });

  // By hand: floor takes half an LSB of the error, and half an increment per update that g2 has to make up for.
  it('stands off by the mean of a floor', () => {
    const lsb = { error: 0.01, word: 0.03, integrator: 1e-3 };
    const expected = roundingOffset({ ...none, errorMean: -lsb.error / 2, lastMean: -lsb.integrator / 2 }, loop);
    expect(expected).toBeCloseTo(0.005 + 5e-4 / gains.g2, 12);
    expect(Math.abs(simulated(gains, lsb, true).mean / -expected - 1)).toBeLessThan(0.03);
  });
});
