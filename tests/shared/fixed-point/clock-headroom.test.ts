import { describe, expect, it } from 'vitest';
import { workOut } from '../../../shared/design';
import { largestErrorHeldPpm } from '../../../shared/fixed-point/clock-headroom';
import type { ClockWords } from '../../../shared/model/words';
import { samplePlan } from '../sample-plan';

const clockOf = (clock: object) => workOut(samplePlan({ clock })).clock!;
const nodeOf = (clock: object, node: string) => clockOf(clock).headroom.find((each) => each.node === node)!;

describe('clockHeadroom', () => {
  // Published: 40 ppm at 2 samples per symbol is 2e-5 counter units per sample: 2e-5 · 2^(32 + 8) LSB with 8 guard bits.
  it('knows what a clock error needs of the integrator', () => {
    const node = nodeOf({}, 'integrator');
    expect(node.reachedBits).toBeCloseTo(Math.log2(2e-5 * 2 ** 40), 9);
    expect(node.headroomBits).toBeCloseTo(39 - Math.log2(2e-5 * 2 ** 40), 9);
    expect(nodeOf({ hold: false }, 'integrator').reachedBits).toBeCloseTo(Math.log2(4e-5 * 2 ** 40), 9);
  });

  // By hand: word 1293·2^3 with a full-scale error of 2^11 reaches 1293·2^14.
  it('knows what the paths reach', () => {
    expect(nodeOf({}, 'proportional').reachedBits).toBeCloseTo(Math.log2(1293) + 14, 9);
  });

  it('has no integrator for order 1', () => {
    const nodes = clockOf({ order: 1 }).headroom.map(({ node }) => node);
    expect(nodes).not.toContain('integrator');
  });
});

describe('largestErrorHeldPpm', () => {
  const words = (clock: object) => clockOf(clock).words as ClockWords;

  // By hand: a limit of 100 ppm is held to one LSB, with hold and without.
  it.each([true, false])('is the limit that was asked for, hold %s', (hold) => {
    const limited = words({ hold, arithmetic: { integratorLimitPpm: 100 } });
    expect(largestErrorHeldPpm(limited, 2)).toBeCloseTo(100, 4);
  });

  it('is never more than the counter can step', () => {
    expect(largestErrorHeldPpm(words({}), 2)).toBeLessThanOrEqual(1e6);
  });

  // By hand, a wide integrator: the step of 2/3 of the counter's range can grow by half of itself; without hold one
  // sample has to make up for all 1.5. A strobe at every sample cannot come earlier.
  it.each([
    [1.5, true, 0.5e6],
    [1.5, false, 1e6 / 3],
    [1, true, 0],
    [2, false, 0.5e6],
  ])('stops where the counter does: %f samples per symbol, hold %s', (samplesPerSymbol, hold, ppm) => {
    const { clock } = workOut(
      samplePlan({
        signal: { samplesPerSymbol },
        clock: {
          detector: samplesPerSymbol < 2 ? 'mueller-muller' : 'gardner',
          hold,
          arithmetic: { integratorBits: 48 },
        },
      }),
    );
    expect(largestErrorHeldPpm(clock!.words as ClockWords, samplesPerSymbol)).toBeCloseTo(ppm, 1);
  });
});
