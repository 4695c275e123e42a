import { describe, expect, it } from 'vitest';
import { boxesOf } from '../../../src/components/bit-boxes';
import { registerSentence, spansOf } from '../../../src/components/register-layout';
import { crests, phaseErrors } from '../../../src/components/sign-in/falling-into-step';

describe('spansOf', () => {
  const lock = [
    { name: 'average', high: 16, low: 8, value: '256' },
    { name: 'threshold', high: 8, low: 0 },
  ];

  it('parts a register into reserved bits, fields and what two of them claim', () => {
    expect(spansOf(lock, 32).map(({ kind, high, low }) => [kind, high, low])).toEqual([
      ['reserved', 31, 17],
      ['field', 16, 9],
      ['clash', 8, 8],
      ['field', 7, 0],
    ]);
  });

  it('says the clash in words', () => {
    expect(registerSentence('LOCK_DET', spansOf(lock, 32))).toBe(
      'LOCK_DET: average 16 to 9 is 256, threshold 7 to 0; average and threshold both claim bit 8',
    );
  });

  it('keeps neighbours of one kind apart', () => {
    const two = [
      { name: 'a', high: 3, low: 2 },
      { name: 'b', high: 1, low: 0 },
    ];
    expect(spansOf(two, 4)).toHaveLength(2);
  });
});

describe('boxesOf', () => {
  const count = (word: Parameters<typeof boxesOf>[0]) => {
    const boxes = boxesOf(word);
    return ['sg', '', 'us', 'gd', 'ov'].map((kind) => boxes.filter((box) => box === kind).length);
  };

  // A 40-bit integrator with 12 guard bits whose largest value has 36 bits: 1 + 3 + 24 + 12 boxes.
  it('draws sign, free, reached and guard bits', () => {
    expect(count({ bits: 40, reached: 36, guard: 12 })).toEqual([1, 3, 24, 12, 0]);
  });

  it('counts a bit that is reached in part as reached', () => {
    expect(count({ bits: 10, reached: 8.9 })).toEqual([1, 0, 9, 0, 0]);
  });

  it('draws a word that is too small wholly as overflow', () => {
    expect(count({ bits: 8, reached: 9, overflow: true })).toEqual([0, 0, 0, 0, 8]);
  });
});

describe('phaseErrors', () => {
  const errors = phaseErrors(2.5, Math.SQRT1_2, 0.0075);

  // By hand: θ = 0.0075·√2/1.5 = 0.00707107, scale 1.01005; g1 = 0.0198010, g2 = 0.000198010, so the first step is
  // (g1 + g2)·sin 2.5 = 0.0119691.
  it('takes the first step of the hand calculation', () => {
    expect(errors[0]! - errors[1]!).toBeCloseTo(0.0119691, 6);
  });

  it('ends in step, within a hundredth of a turn', () => {
    expect(Math.abs(errors.at(-1)!)).toBeLessThan(0.02 * Math.PI);
  });

  it('joins crests that come together as the loop locks', () => {
    const gaps = crests(errors, 30).map(({ carrier, nco }) => nco - carrier);
    expect(gaps[0]).toBeGreaterThan(8);
    expect(Math.abs(gaps.at(-1)!)).toBeLessThan(0.5);
  });
});
