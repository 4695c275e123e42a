import { describe, expect, it } from 'vitest';
import { loopFigures, missingFigures } from '../../../../src/components/plan/figures/loop-figures';
import { keepsUpTo } from '../../../../src/components/plan/figures/margin-figure';
import { crossingHz } from '../../../../src/components/plan/figures/response-figure';
import { examplePlan } from '../../../../src/components/plans/example-plan';
import { design } from '../../support/plan';

const worked = design();
const carrier = loopFigures(worked, 'carrier');
const figure = (number: number) => carrier.find((each) => each.figure === number)!;

describe('loopFigures', () => {
  it('numbers the figures of a carrier loop', () => {
    expect(carrier.map((each) => each.figure)).toEqual([1, 2, 3, 4, 5, 6, 7, 8, 9]);
  });

  it('keeps the numbers of the others where a budget is missing', () => {
    const { clock, ...rest } = worked;
    const without = { ...rest, clock: { ...clock!, budget: null } };
    expect(loopFigures(without, 'clock').map((each) => each.figure)).toEqual([1, 2, 3, 4, 6, 7, 8, 9, 10]);
  });

  it('has none for a loop that is not there', () => {
    const { clock: _clock, ...alone } = examplePlan('corvid-c2');
    expect(loopFigures(design(alone), 'clock')).toEqual([]);
  });

  // Sign detector on QPSK: √2 without noise, 1.3880 at 10 dB (Mengali & D'Andrea 1997); nulls every 90°.
  it('says what noise does to the slope', () => {
    expect(figure(4).caption).toContain('from 1.414 to 1.388; lock every 90°');
  });

  // A separate integration of mask and noise (40 000 frequencies, complex arithmetic, γ = 10) gives
  // 1.953° at BnT 0.0034 as the least and 1.961° at 0.004.
  it('says where the jitter is least', () => {
    expect(figure(5).caption).toBe('The total is least, 1.95°, at BnT 0.0034; track has 1.96° of at most 3.00°.');
  });

  // Phase margin at BnT 0.01: 61.4° at D = 2 and 56.4° at D = 5 (derived); D = 3 lies between.
  it('says the margins at the delay of the plan', () => {
    const [, acquire] = /acquire ([\d.]+)°/.exec(figure(6).caption)!;
    expect(figure(6).caption).toContain('At delay 3 ');
    expect(Number(acquire)).toBeGreaterThan(56.4);
    expect(Number(acquire)).toBeLessThan(61.4);
  });

  it('counts the poles that the delay adds', () => {
    expect(figure(3).caption).toContain('3 more of each stage');
  });

  it('says it when a stage never settles', () => {
    const plan = examplePlan('corvid-c2');
    const far = design({ ...plan, carrier: { ...plan.carrier!, delay: 60 } });
    const captions = loopFigures(far, 'carrier').map(({ caption }) => caption);
    expect(captions[0]).toContain('Acquire never settles');
    expect(captions[2]).toContain('the loop is unstable');
  });

  it('draws each step to the end of the plot', () => {
    const [acquire, track] = figure(1).series.map(({ points }) => points.at(-1)!);
    expect(acquire![0]).toBeGreaterThan(600);
    expect(acquire![1]).toBeCloseTo(1, 2);
    expect(track![1]).toBeCloseTo(1, 1);
  });

  // With these gains 38 and 97 updates of delay are the most (poles on the unit circle, by bisection outside the project).
  it('leaves out what an unstable loop has not, and says so', () => {
    const plan = examplePlan('corvid-c2');
    const unstable = design({ ...plan, carrier: { ...plan.carrier!, delay: 64, stages: [plan.carrier!.stages[0]!] } });
    const figures = loopFigures(unstable, 'carrier');
    expect(figures.map((each) => each.figure)).toEqual([3, 4, 6, 9]);
    for (const at of [2, 3]) expect(figures[at]!.markers).toEqual([]);
    expect(missingFigures(unstable.carrier!)).toContain('Fig. 1, 2, 5, 7 and 8 are left out');
    expect(missingFigures(worked.carrier!)).toBeUndefined();
  });
});

describe('crossingHz', () => {
  // Both change by 20 dB a decade: from 0 against −20 dB at 10 Hz to −20 against 0 dB at 1 kHz they meet at 100 Hz.
  it('is where two straight lines on the log axis meet', () => {
    const response = { frequency: [], frequencyHz: [10, 1000], hDb: [0, -20], eDb: [-20, 0] };
    expect(crossingHz({ response })).toBeCloseTo(100, 9);
  });

  it('is none where H stays above', () => {
    expect(
      crossingHz({ response: { frequency: [], frequencyHz: [1, 2], hDb: [0, 0], eDb: [-9, -9] } }),
    ).toBeUndefined();
  });
});

describe('keepsUpTo', () => {
  const marginAgainstDelay = { delay: [0, 1, 2, 3], phaseDeg: [60, 50, 40, null] };
  it('is the last delay that holds the limit', () => {
    expect(keepsUpTo({ marginAgainstDelay }, 45)).toBe(1);
    expect(keepsUpTo({ marginAgainstDelay }, 70)).toBeUndefined();
    expect(keepsUpTo({ marginAgainstDelay }, 30)).toBe(2);
  });
});
