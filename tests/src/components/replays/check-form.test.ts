import { describe, expect, it } from 'vitest';
import { examplePlan } from '../../../../src/components/plans/example-plan';
import {
  checkOf,
  esN0Doubt,
  formOf,
  missingTrials,
  readEsN0,
  suggestedForm,
  symbolCount,
  trialsToDecide,
} from '../../../../src/components/replays/check-form';
import { check } from '../../support/replay';

const plan = examplePlan('corvid-c2');

describe('suggestedForm', () => {
  // By hand: 1.55 GHz at 25 ppm, both ends, is 77.5 kHz.
  it('asks for the whole tolerance of the plan at its Es/N0', () => {
    expect(suggestedForm(plan)).toMatchObject({ startHz: -77_500, stopHz: 77_500, esN0Text: '10' });
  });

  it('makes a trial at least twice as long as the stages before the last', () => {
    const slow = {
      ...plan,
      carrier: { ...plan.carrier!, stages: [{ name: 'acquire', noiseBandwidth: 0.01, until: { symbols: 30_000 } }] },
    };
    expect(suggestedForm(plan).symbols).toBe(20_000);
    expect(suggestedForm(slow).symbols).toBe(60_000);
  });

  it('leaves the range to the person where the plan gives no tolerance', () => {
    expect(suggestedForm({ ...plan, environment: {} })).toMatchObject({ startHz: undefined, stopHz: undefined });
  });
});

describe('readEsN0', () => {
  it.each([
    ['6.5, 10', [6.5, 10]],
    ['6.5 10 dB', [6.5, 10]],
    ['−2;0', [-2, 0]],
    ['ten', undefined],
    ['', undefined],
  ])('reads “%s”', (text, values) => {
    expect(readEsN0(text)).toEqual(values);
  });
});

describe('esN0Doubt', () => {
  it.each([
    ['6,5', '6,5: 6.5, or 6 and 5? Type 6.5 or 6, 5.'],
    ['10 −6,5 dB', '−6,5: −6.5, or −6 and 5? Type −6.5 or −6, 5.'],
  ])('asks which reading of “%s” is meant', (text, question) => {
    expect(esN0Doubt(text)).toBe(question);
    expect(readEsN0(text)).toBeUndefined();
  });

  it.each(['6.5,10', '6, 5', '4,6,8', '6;5', '10'])('has one reading of “%s”', (text) => {
    expect(esN0Doubt(text)).toBeUndefined();
    expect(readEsN0(text)).toBeDefined();
  });
});

describe('checkOf', () => {
  it('gives back the check that a form was made of', () => {
    expect(checkOf(formOf(check))).toEqual(check);
  });

  it.each(['startHz', 'points', 'symbols', 'trials', 'seed', 'lockProbability'] as const)('waits for %s', (key) => {
    expect(checkOf({ ...formOf(check), [key]: undefined })).toBeUndefined();
  });

  it('takes a seed of 0', () => {
    expect(checkOf({ ...formOf(check), seed: 0 })?.seed).toBe(0);
  });
});

describe('symbolCount', () => {
  // By hand: 5 offsets × 2 Es/N0 × 400 trials × 20 000 symbols = 80 million.
  it('multiplies points, trials and symbols', () => {
    expect(symbolCount(formOf(check))).toBe(80_000_000);
  });
});

describe('missingTrials', () => {
  // 368: by hand in least-trials.test.ts.
  it('names the fewest trials that could pass, when the form has fewer', () => {
    expect(missingTrials({ ...formOf(check), trials: 367 })).toBe(368);
    expect(missingTrials({ ...formOf(check), trials: 368 })).toBeUndefined();
  });
});

describe('trialsToDecide', () => {
  // 1.2 × 368 = 441.6, rounded up to a hundred.
  it('is never so few that no point could pass', () => {
    expect(trialsToDecide({ ...check, trials: 40 })).toBe(500);
  });

  it('triples what was run, up to what a check may have', () => {
    expect(trialsToDecide({ ...check, trials: 400 })).toBe(1200);
    expect(trialsToDecide({ ...check, trials: 5000 })).toBe(10_000);
  });
});
