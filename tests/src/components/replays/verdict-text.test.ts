import { describe, expect, it } from 'vitest';
import { offsetScale } from '../../../../src/components/replays/offset-scale';
import { falseLockText, requiredText, verdictText } from '../../../../src/components/replays/verdict-text';
import { check, replay, result } from '../../support/replay';

const scale = offsetScale([-77_500, -38_750, 0, 38_750, 77_500]);
const only = (...points: ReturnType<typeof result>[]) =>
  verdictText(replay({ check: { ...check, esN0Db: [6.5] }, points }), scale);

describe('verdictText', () => {
  it('names the whole range where every offset is proved', () => {
    expect(only(...[0, 1, 2, 3, 4].map((index) => result(index, 'pass')))).toBe(
      '6.5 dB: proved from −77.50 to +77.50 kHz.',
    );
  });

  it('keeps undecided apart from proved and refuted', () => {
    const points = [result(0, 'fail'), result(1, 'pass'), result(2, 'pass'), result(3, 'pass'), result(4, 'undecided')];
    expect(only(...points)).toBe(
      '6.5 dB: proved from −38.75 to +38.75 kHz, undecided at +77.50 kHz, refuted at −77.50 kHz.',
    );
  });

  it('does not bridge an offset that has not run', () => {
    expect(only(result(0, 'pass'), result(2, 'pass'))).toBe(
      '6.5 dB: proved at −77.50 and at 0.00 kHz, 3 of 5 offsets not run.',
    );
  });

  it('tells each Es/N0 by itself', () => {
    const text = verdictText(replay({ points: [result(0, 'pass'), result(5, 'fail')] }), scale);
    expect(text).toBe(
      '6.5 dB: proved at −77.50 kHz, 4 of 5 offsets not run. 10 dB: refuted at −77.50 kHz, 4 of 5 offsets not run.',
    );
  });
});

describe('requiredText', () => {
  const points = [result(0, 'fail'), result(1, 'pass'), result(2, 'undecided'), result(3, 'pass'), result(4, 'fail')];

  it('counts the points inside the range of the plan', () => {
    const text = requiredText(replay({ points }), 40_000, scale);
    expect(text).toBe('Inside the required ±40 kHz: 2 proved, 1 undecided.');
    expect(requiredText(replay({ points: [result(2, 'pass')] }), 40_000, scale)).toContain('all 1 proved');
  });

  it('is silent where the check does not go beyond that range, or the plan asks for none', () => {
    expect(requiredText(replay({ points }), 77_500, scale)).toBeUndefined();
    expect(requiredText(replay({ points }), 0, scale)).toBeUndefined();
  });
});

describe('falseLockText', () => {
  it('counts trials and points', () => {
    expect(
      falseLockText([result(0, 'fail', { falseLocks: 2 }), result(1, 'pass'), result(4, 'fail', { falseLocks: 1 })]),
    ).toBe('3 trials at 2 points settled on a wrong frequency or phase: false lock.');
  });

  it('is silent where there was none', () => {
    expect(falseLockText([result(0, 'fail')])).toBeUndefined();
  });
});
