import { describe, expect, it } from 'vitest';
import { swiftLoopVariances } from '../../../shared/budget/swift-loop-variances';
import type { LoopNoise } from '../../../shared/budget/loop-energies';
import { nominalGains } from '../../../shared/loop/gains';
import { linearLoop } from '../../../shared/loop/linear-loop';
import { impulseResponse } from '../loop/brute-force';

const loopOf = (order: number, theta: number, delay: number) =>
  linearLoop({ gains: nominalGains(order, { damping: 0.8, theta }), delay, averaged: 1 });

/** Σ c[l]·r[l] over both signs, r from the impulse response, update by update. */
function summed(h: number[], covariance: readonly number[]): number {
  return covariance.reduce((sum, value, lag) => {
    const r = h.reduce((total, x, k) => total + x * (h[k + lag] ?? 0), 0);
    return sum + (lag === 0 ? 1 : 2) * value * r;
  }, 0);
}

// Independent: the impulse response by difference equations.
describe('swiftLoopVariances', () => {
  const coloured: LoopNoise = { entry: 'error', covariance: [1, -0.4, -0.05, 0.02] };
  it.each([
    [1, 0.01, 0],
    [2, 0.02, 3],
    [2, 0.005, 20],
    [3, 0.01, 4],
  ])('sums covariance times autocorrelation: order %i, θ %f, delay %i', (order, theta, delay) => {
    const loop = loopOf(order, theta, delay);
    const h = impulseResponse(loop, 12_000);
    const [white, pattern] = swiftLoopVariances(loop, [{ entry: 'error', covariance: [2] }, coloured])!;
    expect(white! / summed(h, [2])).toBeCloseTo(1, 7);
    expect(pattern! / summed(h, coloured.covariance)).toBeCloseTo(1, 6);
  });

  // Noise on the word is summed by the oscillator as the controls are: h of the word is that of the error over g1 at order 1.
  it('lets noise in on the word', () => {
    const loop = loopOf(1, 0.01, 2);
    const h = impulseResponse(loop, 6000);
    const [word] = swiftLoopVariances(loop, [{ entry: 'word', covariance: [1] }])!;
    expect(word! / (summed(h, [1]) / loop.gains.g1 ** 2)).toBeCloseTo(1, 7);
  });

  it('is null for an unstable loop', () => {
    expect(swiftLoopVariances(loopOf(2, 0.05, 30), [coloured])).toBeNull();
  });
});
