import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { loopVariances } from '../../../shared/budget/loop-energies';
import type { NoiseEntry } from '../../../shared/budget/loop-energies';
import { nominalGains, secondOrderGains } from '../../../shared/loop/gains';
import { linearLoop } from '../../../shared/loop/linear-loop';
import type { LinearLoop } from '../../../shared/loop/linear-loop';
import { noiseBandwidth } from '../../../shared/loop/noise-bandwidth';

const nominal = (bandwidth: number, { order = 2, delay = 0, averaged = 1 } = {}) => {
  const perOmega = { 1: 0.25, 2: 0.75 * Math.SQRT1_2, 3: 0.7845 }[order] as number;
  const theta = bandwidth / (2 * perOmega);
  return linearLoop({ gains: nominalGains(order, { damping: Math.SQRT1_2, theta }), delay, averaged });
};

/** Answer of the oscillator phase to a unit impulse at an entry, from the difference equations of the datapath contract. */
function impulseResponse(loop: LinearLoop, entry: NoiseEntry, length: number): Float64Array {
  const { gains, delay, averaged } = loop;
  const weight = (averaged + 1) / (2 * averaged);
  const phase = new Float64Array(length + 1);
  const words: number[] = [];
  let [rate, ramp] = [0, 0];
  for (let k = 0; k < length; k += 1) {
    const impulse = (at: NoiseEntry): number => (k === 0 && entry === at ? 1 : 0);
    const error = impulse('error') - weight * phase[k]! - (1 - weight) * (k > 0 ? phase[k - 1]! : 0);
    ramp += gains.g3 * error + impulse('integrator2');
    rate += gains.g2 * error + ramp + impulse('integrator');
    words.push(gains.g1 * error + rate + impulse('word'));
    phase[k + 1] = phase[k]! + (k >= delay ? words[k - delay]! : 0);
  }
  return phase;
}

/** Σ c[l]·r[l] over both signs of the lag, summed out. */
function summed(response: Float64Array, covariance: readonly number[]): number {
  let sum = 0;
  covariance.forEach((value, lag) => {
    let correlation = 0;
    for (let k = 0; k + lag < response.length; k += 1) correlation += response[k]! * response[k + lag]!;
    sum += (lag === 0 ? 1 : 2) * value * correlation;
  });
  return sum;
}

describe('loopVariances', () => {
  const entries: NoiseEntry[] = ['error', 'word', 'integrator', 'integrator2'];

  // The difference equations of this file, run until nothing is left: an independent path.
  it('sums covariance times autocorrelation of the response, at every entry, with delay and averaging', () => {
    fc.assert(
      fc.property(
        fc.record({
          order: fc.constantFrom(1, 2, 3),
          bandwidth: fc.double({ min: 0.004, max: 0.02, noNaN: true }),
          delay: fc.integer({ min: 0, max: 6 }),
          averaged: fc.constantFrom(1, 1, 4, 16),
        }),
        fc.array(fc.double({ min: -0.4, max: 0.4, noNaN: true }), { minLength: 0, maxLength: 12 }),
        ({ bandwidth, ...shape }, tail) => {
          const loop = nominal(bandwidth, shape);
          const noises = entries
            .slice(0, loop.order + 1)
            .flatMap((entry) => [[1], [1, ...tail]].map((covariance) => ({ entry, covariance })));
          const variances = loopVariances(loop, noises)!;
          noises.forEach(({ entry, covariance }, i) => {
            const response = impulseResponse(loop, entry, 12_000);
            const scale = summed(response, [1]);
            expect(Math.abs(variances[i]! - summed(response, covariance))).toBeLessThan(1e-7 * scale);
          });
        },
      ),
      { numRuns: 25 },
    );
  });

  // Derived: white noise on the error leaves 2·BnTu of its variance, and BnTu is known to 1e-9 from elsewhere.
  it.each([1e-5, 1e-3, 0.05])('leaves 2·BnTu of white noise at BnTu %f', (bandwidth) => {
    const loop = nominal(bandwidth, { delay: bandwidth < 0.01 ? 7 : 1 });
    const [variance] = loopVariances(loop, [{ entry: 'error', covariance: [1] }])!;
    expect(Math.abs(variance! / (2 * noiseBandwidth(loop)!) - 1)).toBeLessThan(1e-9);
  });

  // Derived: a random walk of unit step on the phase leaves 2/(g1·(4 − 2g1 − g2)), of order 2 without delay.
  it('leaves of a random walk what the closed form says', () => {
    const gains = secondOrderGains({ damping: 0.5, theta: 0.01 });
    const [variance] = loopVariances(linearLoop({ gains, delay: 0, averaged: 1 }), [
      { entry: 'word', covariance: [1] },
    ])!;
    expect(variance! * gains.g1 * (4 - 2 * gains.g1 - gains.g2)).toBeCloseTo(2, 9);
  });

  it('knows nothing of an unstable loop', () => {
    expect(loopVariances(nominal(0.05, { delay: 20 }), [{ entry: 'error', covariance: [1, 0.2] }])).toBeNull();
  });
});
