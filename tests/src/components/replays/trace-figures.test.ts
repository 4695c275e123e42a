import { describe, expect, it } from 'vitest';
import type { ReplayTrace } from '../../../../src/api/replays';
import { offsetScale } from '../../../../src/components/replays/offset-scale';
import { traceFigures, traceSentence } from '../../../../src/components/replays/trace-figures';

const trace: ReplayTrace = {
  symbols: 20_000,
  decimation: 5000,
  symbol: [0, 5000, 10_000, 15_000],
  phaseErrorDeg: [40, 3, 1, 0.5],
  frequencyHz: [0, 76_000, 77_600, 77_500],
  integratorHz: [0, 75_000, 77_500, 77_500],
  stage: [0, 0, 1, 1],
  lockedAtSymbol: 2971,
  outcome: 'locked',
  constellation: { before: [], after: [] },
};

describe('traceFigures', () => {
  it('marks the lock and the change of stage on the axis of symbols', () => {
    const [integrator] = traceFigures(trace, 77_500, offsetScale([77_500]));
    expect(integrator!.limits).toMatchObject([
      { at: 2971, axis: 'x', label: 'locked at 2\u202f971' },
      { at: 10_000, axis: 'x', label: 'stage switch' },
    ]);
  });

  it('shows frequencies in the unit of the offsets', () => {
    const [integrator] = traceFigures(trace, 77_500, offsetScale([77_500]));
    expect(integrator!.series[0]!.points.at(-1)).toEqual([15_000, 77.5]);
    expect(integrator!.y.ticks).toEqual([0, 77.5]);
  });
});

describe('traceSentence', () => {
  it.each([
    [{ ...trace }, 'Locked at symbol 2\u202f971 of 20\u202f000 symbols, and it holds to the end.'],
    [{ ...trace, outcome: 'unlocked' as const, lockedAtSymbol: null }, 'Not locked within 20\u202f000 symbols.'],
  ])('says what became of the trial', (of, sentence) => {
    expect(traceSentence(of)).toBe(sentence);
  });

  it('never calls a false lock a lock', () => {
    const sentence = traceSentence({ ...trace, outcome: 'false-lock', lockedAtSymbol: null });
    expect(sentence).toContain('frequency or the phase is wrong: false lock');
  });
});
