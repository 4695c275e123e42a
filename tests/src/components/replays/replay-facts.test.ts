import { mount } from '@vue/test-utils';
import { describe, expect, it } from 'vitest';
import { esN0Text, limitText, offsetsText, replayStanding } from '../../../../src/components/replays/replay-facts';
import ReplayVerdict from '../../../../src/components/replays/ReplayVerdict.vue';
import { check, replay, result } from '../../support/replay';

describe('replayStanding', () => {
  it.each([
    [{ state: 'done', verdict: 'pass' }, 'pass', 'Locks over the whole range'],
    [{ state: 'done', verdict: 'fail' }, 'fail', 'Does not lock everywhere'],
    [{ state: 'done', verdict: 'undecided' }, 'undecided', 'Not enough trials to say'],
    [{ state: 'cancelled', verdict: null }, 'none', 'Cancelled'],
    [{ state: 'failed', verdict: null }, 'fail', 'Stopped by an error'],
    [{ state: 'running', verdict: null }, 'running', 'Running'],
  ] as const)('%o is %s', (of, state, label) => {
    expect(replayStanding(of)).toEqual({ state, label });
  });
});

describe('the strip of a replay', () => {
  it('writes offsets, levels and the limit as a tester says them', () => {
    expect(offsetsText(check)).toBe('5, ±77.5 kHz');
    expect(offsetsText({ ...check, carrierOffsetHz: { start: 6.775e6, stop: 6.975e6, points: 9 } })).toBe(
      '9, +6.775 to +6.975 MHz',
    );
    expect(offsetsText({ ...check, carrierOffsetHz: { start: -500, stop: 0, points: 1 } })).toBe('1, −500 Hz');
    expect(esN0Text(check)).toBe('6.5 and 10 dB');
    expect(limitText(check)).toBe('locked, min 0.99 at 95 %');
  });
});

describe('ReplayVerdict', () => {
  const verdict = (more: Parameters<typeof replay>[0], runs = true) =>
    mount(ReplayVerdict, {
      props: { replay: replay(more), requiredHz: 0, runs },
      global: { stubs: { RouterLink: { template: '<a><slot /></a>' } } },
    });

  it('offers more trials to an undecided replay, and only to those who may run it', () => {
    const undecided = { state: 'done', verdict: 'undecided', points: [result(2, 'undecided')] } as const;
    expect(verdict({ ...undecided, points: [...undecided.points] }).text()).toContain('Run with 1\u202f200 trials');
    expect(verdict({ ...undecided, points: [...undecided.points] }, false).text()).not.toContain('Run with');
    expect(verdict({ state: 'done', verdict: 'pass', points: [result(2, 'pass')] }).text()).not.toContain('Run with');
  });

  it('gives the reason of a replay that an error stopped', () => {
    expect(verdict({ state: 'failed', error: 'The words do not fit.' }).text()).toContain('The words do not fit.');
  });
});
