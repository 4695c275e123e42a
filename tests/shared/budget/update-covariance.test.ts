import { describe, expect, it } from 'vitest';
import { loopVariances } from '../../../shared/budget/loop-energies';
import { seenBySymbols, shortened, updateCovariance } from '../../../shared/budget/update-covariance';
import { secondOrderGains } from '../../../shared/loop/gains';
import { linearLoop } from '../../../shared/loop/linear-loop';
import { gaussians } from './noise';

describe('updateCovariance', () => {
  // By hand: the mean of two errors of covariance 1, ½ has variance (2 + 2·½)/4, and ½/4 with the next.
  it('averages U errors', () => {
    expect(updateCovariance([1, 0.5], 2)).toEqual([0.75, 0.125]);
    expect(updateCovariance([1], 4)).toEqual([0.25]);
  });

  // By hand: held over two updates an error is next to itself half of the time.
  it('holds an error over m updates', () => {
    expect(updateCovariance([1], 0.5)).toEqual([1, 0.5]);
    expect(updateCovariance([1, 0.2], 0.5)).toEqual([1, 0.6, 0.2, 0.1]);
  });

  // The sum over all lags is the spectrum at 0, which neither averaging nor holding changes but for the rate: 1/U of it.
  it.each([2, 16, 0.5, 0.25, 1 / 512])('keeps the spectrum at 0 per symbol, U = %f', (interval) => {
    const whole = (covariance: number[]) => covariance.reduce((sum, value, lag) => sum + (lag ? 2 : 1) * value, 0);
    const covariance = [1, -0.4, 0.15, 0.02];
    expect(whole(updateCovariance(covariance, interval)) * interval).toBeCloseTo(whole(covariance), 12);
  });
});

/**
 * A loop that adds up U errors while its oscillator turns every symbol, run symbol by symbol on noise alone: the variance
 * of the phase that the symbols see, over that of one error.
 */
function simulated({ g1, g2 }: { g1: number; g2: number }, counted: number, colour: number, symbols: number): number {
  const noise = gaussians(7);
  let [phase, rate, word, sum, last, square] = [0, 0, 0, 0, noise(), 0];
  for (let k = 0; k < symbols; k += 1) {
    const fresh = noise();
    square += phase ** 2;
    sum += fresh + colour * last - phase;
    last = fresh;
    if (k % counted === counted - 1) {
      rate += (g2 * sum) / counted;
      word = (g1 * sum) / counted + rate;
      sum = 0;
    }
    phase += word / counted;
  }
  return square / symbols;
}

describe('the phase that symbols see', () => {
  // A seeded simulation in this file, tolerance 2 % (three deviations); white errors and coloured ones.
  it.each([
    [1, 0.02, 0],
    [1, 0.05, -0.7],
    [4, 0.05, 0],
    [4, 0.1, -0.7],
    [16, 0.1, 0],
  ])('U = %i, BnTu %f, colour %f', (counted, bandwidth, colour) => {
    const gains = secondOrderGains({ damping: Math.SQRT1_2, theta: bandwidth / (1.5 * Math.SQRT1_2) });
    const loop = linearLoop({ gains, delay: 0, averaged: counted });
    const covariance = seenBySymbols(updateCovariance([1 + colour ** 2, colour], counted), counted);
    const [variance] = loopVariances(loop, [{ entry: 'error', covariance }])!;
    expect(Math.abs(simulated(gains, counted, colour, 3e6) / variance! - 1)).toBeLessThan(0.02);
  });
});

describe('shortened', () => {
  // By hand: Σ c over both sides and Σ l·c stay, 1 + 2·(0.5 + 0.25 + 0.125 + 0.0625) and 0.5 + 0.5 + 0.375 + 0.25.
  it('keeps the spectrum at 0 and the first moment', () => {
    const short = shortened([1, 0.5, 0.25, 0.125, 0.0625], 3);
    expect(short.length).toBe(3);
    expect(short[0]! + 2 * (short[1]! + short[2]!)).toBeCloseTo(2.875, 12);
    expect(short[1]! + 2 * short[2]!).toBeCloseTo(1.625, 12);
    expect(shortened([1, 0.5], 3)).toEqual([1, 0.5]);
  });
});
