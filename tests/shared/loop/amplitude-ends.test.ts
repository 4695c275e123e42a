import { describe, expect, it } from 'vitest';
import { amplitudeEnds } from '../../../shared/loop/amplitude-ends';
import { secondOrderGains } from '../../../shared/loop/gains';
import { linearLoop } from '../../../shared/loop/linear-loop';
import { summedBandwidth } from './brute-force';

const loop = linearLoop({ gains: secondOrderGains({ damping: Math.SQRT1_2, theta: 0.001 }), delay: 2, averaged: 1 });
const scale = { updateInterval: 1, frequencyHz: (theta: number) => theta };
const ends = (toleranceDb: number, exponent: number) => amplitudeEnds(loop, { toleranceDb, exponent }, scale);

describe('amplitudeEnds', () => {
  // Published (F. Gardner, Phaselock Techniques): ζ and ωn of an order-2 loop go with the root of its gain.
  it('moves damping and natural frequency with the root of the gain', () => {
    const { low, high } = ends(2, 1);
    expect(high.damping! / low.damping!).toBeCloseTo(10 ** (4 / 40), 2);
    expect(high.naturalFrequencyHz! / low.naturalFrequencyHz!).toBeCloseTo(10 ** (4 / 40), 2);
  });

  // Independent: the impulse response of the loop with its gains multiplied by hand.
  it('has the noise bandwidth of the loop whose gain has moved, twice as many decibels for a square law', () => {
    const { high, low } = ends(3, 2);
    const louder = { ...loop, gains: { g1: loop.gains.g1 * 10 ** 0.3, g2: loop.gains.g2 * 10 ** 0.3, g3: 0 } };
    expect(high).toMatchObject({ amplitudeDb: 3, gainDb: 6, stable: true });
    expect(high.noiseBandwidth! / summedBandwidth(louder, 60_000)).toBeCloseTo(1, 9);
    expect(low).toMatchObject({ amplitudeDb: -3, gainDb: -6 });
  });

  it('says when one end is unstable', () => {
    const wide = { ...loop, gains: { g1: 0.6, g2: 0.05, g3: 0 } };
    const { high } = amplitudeEnds(wide, { toleranceDb: 10, exponent: 2 }, scale);
    expect(high).toMatchObject({ stable: false, noiseBandwidth: null, phaseDeg: null });
  });
});
