import { describe, expect, it } from 'vitest';
import { clopperPearson, overallVerdict, pointVerdict } from '../../../shared/replay/verdict';

describe('clopperPearson', () => {
  // All of n: (α/2)^(1/n) in closed form, 0.025^(1/400) = 0.99082. 399 of 400 proves 0.9862 and 394 of 400 spans
  // 0.9676 … 0.9945; 0 of 20 ends at 0.1684, 8 of 20 spans 0.1912 … 0.6395 (tables of the exact interval).
  it.each([
    [400, 400, 0.9908, 1],
    [399, 400, 0.9862, 0.9999],
    [394, 400, 0.9676, 0.9945],
    [0, 20, 0, 0.1684],
    [8, 20, 0.1912, 0.6395],
  ])('%i of %i at 95 %%: %f to %f', (successes, trials, lower, upper) => {
    const interval = clopperPearson({ successes, trials, confidence: 0.95 });
    expect(interval.lower).toBeCloseTo(lower, 4);
    expect(interval.upper).toBeCloseTo(upper, 4);
  });

  it('is the closed form at both ends', () => {
    for (const trials of [1, 7, 10000]) {
      const end = 0.005 ** (1 / trials);
      expect(clopperPearson({ successes: trials, trials, confidence: 0.99 }).lower).toBeCloseTo(end, 10);
      expect(clopperPearson({ successes: 0, trials, confidence: 0.99 }).upper).toBeCloseTo(1 - end, 10);
    }
  });

  // The defining equation: at the lower end, k or more successes have probability α/2.
  it.each([
    [3, 12],
    [11, 12],
    [60, 61],
  ])('leaves α/2 above the lower end for %i of %i', (successes, trials) => {
    const { lower } = clopperPearson({ successes, trials, confidence: 0.9 });
    let term = (1 - lower) ** trials;
    let below = 0;
    for (let k = 0; k < successes; k++) {
      below += term;
      term *= (((trials - k) / (k + 1)) * lower) / (1 - lower);
    }
    expect(1 - below).toBeCloseTo(0.05, 8);
  });

  it.each([
    ['trials', { successes: 0, trials: 0, confidence: 0.95 }],
    ['successes', { successes: 5, trials: 4, confidence: 0.95 }],
    ['confidence', { successes: 4, trials: 4, confidence: 1 }],
  ])('names %s', (parameter, proportion) => {
    expect(() => clopperPearson(proportion)).toThrow(expect.objectContaining({ parameter }));
  });
});

describe('pointVerdict', () => {
  it('passes, fails, or says that there are not enough trials', () => {
    expect(pointVerdict({ lower: 0.9908, upper: 1 }, 0.99)).toBe('pass');
    expect(pointVerdict({ lower: 0.9862, upper: 0.9999 }, 0.99)).toBe('undecided');
    expect(pointVerdict({ lower: 0.942, upper: 0.9807 }, 0.99)).toBe('fail');
  });
});

describe('overallVerdict', () => {
  const of = (...verdicts: ('pass' | 'fail' | 'undecided')[]) => verdicts.map((verdict) => ({ verdict }));

  it('needs every point to pass', () => {
    expect(overallVerdict(of('pass', 'pass'), 2)).toBe('pass');
    expect(overallVerdict(of('pass', 'pass'), 3)).toBe('undecided');
    expect(overallVerdict(of('pass', 'undecided'), 2)).toBe('undecided');
    expect(overallVerdict(of('undecided', 'fail'), 3)).toBe('fail');
  });
});
