import { describe, expect, it } from 'vitest';
import { integralDeadBands } from '../../../shared/fixed-point/dead-band';
import {
  carrierHeadroom,
  frequencyResolutionHz,
  largestOffsetHeldHz,
  type HeadroomInput,
} from '../../../shared/fixed-point/headroom';
import { carrierWords } from '../../../shared/fixed-point/words';
import { roundShift } from '../../../shared/fixed-point/rounding';
import { qpskLink } from './link';

const words = carrierWords(qpskLink);
const input: HeadroomInput = {
  words,
  symbolRateBd: 27.5e6,
  amplitude: 0.5,
  peak: 1,
  esN0Db: 10,
  largestOffsetHz: 77500,
  stageNames: ['acquire'],
};
const nodeOf = (name: string, change: Partial<HeadroomInput> = {}) =>
  carrierHeadroom({ ...input, ...change }).find(({ node }) => node === name)!;

describe('frequencyResolutionHz', () => {
  // 100 MHz / 2^32.
  it('is 0.0232830644 Hz at 100 MHz and 32 bits', () => {
    expect(frequencyResolutionHz(words, 100e6)).toBeCloseTo(0.0232830644, 10);
  });
});

describe('largestOffsetHeldHz', () => {
  it('is the limit as a frequency', () => {
    const limited = { ...words, integratorLimit: Math.floor((77500 / 27.5e6) * 2 ** 44) };
    expect(largestOffsetHeldHz(limited, 27.5e6)).toBeCloseTo(77500, 4);
  });

  // 44 bits with 12 below an NCO LSB hold half the NCO clock.
  it('is half the clock where the integrator spans the NCO', () => {
    expect(largestOffsetHeldHz(words, 27.5e6)).toBeCloseTo(13.75e6, 2);
  });
});

describe('carrierHeadroom', () => {
  // By hand: σ of a rail is 0.5/√20 = 0.1118, so 0.5 + 4σ = 0.9472 of a full scale of 1: log2 = −0.0782.
  it('counts amplitude and four deviations of noise into a sample', () => {
    expect(nodeOf('sample').headroomBits).toBeCloseTo(0.0782, 3);
    expect(nodeOf('sample').headroomDb).toBeCloseTo(0.471, 2);
  });

  // By hand: 77500/27.5e6·2^44 = 4.9578e10 = 2^35.529 of 2^43.
  it('holds the largest offset in the integrator', () => {
    expect(nodeOf('integrator').reachedBits).toBeCloseTo(35.529, 3);
    expect(nodeOf('integrator').headroomBits).toBeCloseTo(7.471, 3);
    expect(nodeOf('integrator').fullScaleHz).toBeCloseTo(13.75e6, 0);
  });

  it('measures the integrator against its limit where it has one', () => {
    const limited = { ...words, integratorLimit: Math.floor((77500 / 27.5e6) * 2 ** 44) };
    expect(nodeOf('integrator', { words: limited }).headroomBits).toBeCloseTo(0, 6);
    expect(nodeOf('integrator', { words: limited, largestOffsetHz: 155000 }).headroomBits).toBeCloseTo(-1, 6);
  });

  // By hand: 77.5 kHz is 77500/27.5e6·2^32 = 12104003 NCO LSB, and what the proportional path adds at most.
  it('lets the limit bound the frequency word', () => {
    const limited = { ...words, integratorLimit: Math.floor((77500 / 27.5e6) * 2 ** 44) };
    const [free, bounded] = [words, limited].map((of) => 2 ** nodeOf('frequency-word', { words: of }).worstBits);
    const proportional = 2 ** nodeOf('proportional').worstBits;
    expect((free! - proportional) / 2 ** 31).toBeCloseTo(1, 9);
    expect((bounded! - proportional) / 12_104_003).toBeCloseTo(1, 6);
  });

  it('names the stage of each gain', () => {
    expect(nodeOf('proportional').stage).toBe('acquire');
    expect(nodeOf('sample').stage).toBeNull();
  });

  it('loses one bit of headroom where the amplitude doubles', () => {
    const twice = nodeOf('error', { amplitude: 1 });
    expect(nodeOf('error').headroomBits - twice.headroomBits).toBeCloseTo(1, 9);
  });

  it('has no integrator in order 1', () => {
    const first = carrierHeadroom({ ...input, words: { ...words, order: 1 } });
    expect(first.map(({ node }) => node)).toEqual(['sample', 'error', 'proportional', 'frequency-word']);
  });
});

describe('integralDeadBands', () => {
  it.each(['floor', 'nearest', 'convergent'] as const)('is all that moves nothing under %s', (rounding) => {
    for (const mantissa of [1, 3, 100, -7]) {
      const stages = [{ ...words.stages[0]!, integral: { mantissa, shift: 6 } }];
      const [band] = integralDeadBands({ ...words, rounding, errorBits: 8, stages });
      for (let d = -128; d < 128; d++) {
        const still = roundShift(BigInt(d * mantissa), 6, rounding) === 0n;
        expect(d >= band!.least && d <= band!.most, `d = ${d}, M = ${mantissa}`).toBe(still);
      }
    }
  });

  it('pulls by half an LSB per update under floor', () => {
    const stages = [{ ...words.stages[0]!, integral: { mantissa: 1, shift: 6 } }];
    expect(integralDeadBands({ ...words, rounding: 'floor', stages })[0]!.pull).toBe(-0.5);
  });
});
