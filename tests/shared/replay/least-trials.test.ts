import { describe, expect, it } from 'vitest';
import { leastTrials } from '../../../shared/replay/least-trials';

describe('leastTrials', () => {
  // By hand from (α/2)^(1/n) at the limit: 0.025^(1/368) = 0.990026, 0.025^(1/367) = 0.989999.
  it('finds 368 trials for 0.99 at 95 %', () => {
    expect(leastTrials({ lockProbability: 0.99, confidence: 0.95 })).toBe(368);
  });

  // The same with 0.005^(1/n): 0.9^50 = 0.005154 is still above 0.005, 0.9^51 = 0.004638 is below.
  it('finds 51 trials for 0.9 at 99 %', () => {
    expect(leastTrials({ lockProbability: 0.9, confidence: 0.99 })).toBe(51);
  });

  it('needs one trial for a probability of 0 and endless ones for 1', () => {
    expect(leastTrials({ lockProbability: 0, confidence: 0.95 })).toBe(1);
    expect(leastTrials({ lockProbability: 1, confidence: 0.95 })).toBe(Infinity);
  });

  it.each([
    { lockProbability: NaN, confidence: 0.95, parameter: 'lockProbability' },
    { lockProbability: 1.1, confidence: 0.95, parameter: 'lockProbability' },
    { lockProbability: 0.9, confidence: 1, parameter: 'confidence' },
    { lockProbability: 0.9, confidence: 0, parameter: 'confidence' },
  ])('names $parameter outside its range', ({ parameter, ...limits }) => {
    expect(() => leastTrials(limits)).toThrow(expect.objectContaining({ parameter }));
  });
});
