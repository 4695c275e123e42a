import { describe, expect, it } from 'vitest';
import type { PlanSummary } from '../../../../src/api/plans';
import { countByState, groupByTarget, matching, stateOf } from '../../../../src/components/plans/plan-filter';
import { plan } from '../../support/plan-summary';

const counts = (fail: number, caution: number) => ({ head: { ...plan().head!, counts: { pass: 20, caution, fail } } });

describe('stateOf', () => {
  it.each<[Partial<PlanSummary>, string]>([
    [counts(1, 2), 'fail'],
    [counts(0, 2), 'caution'],
    [counts(0, 0), 'pass'],
    [{ head: null }, 'none'],
  ])('takes the worst finding of the newest revision', (more, state) => {
    expect(stateOf(plan(more))).toBe(state);
  });
});

describe('matching', () => {
  const plans = [plan(), plan({ name: 'Beacon, BPSK 9.6 k', modulation: 'BPSK' })];

  it.each([
    ['transponder', 1],
    ['CORVID bpsk', 1],
    ['corvid-c2', 2],
    ['beacon qpsk', 0],
    ['  ', 2],
  ])('finds by every word of “%s”', (text, found) => {
    expect(matching(plans, text)).toHaveLength(found);
  });
});

describe('countByState and groupByTarget', () => {
  it('counts plans, not findings', () => {
    expect(countByState([plan(counts(3, 0)), plan(counts(0, 5)), plan({ head: null })])).toEqual({
      fail: 1,
      caution: 1,
      pass: 0,
      none: 1,
    });
  });

  it('keeps the order in which targets and plans come', () => {
    const other = plan({ target: { slug: 'corvid-c1', name: 'Corvid C1' } });
    const groups = groupByTarget([other, plan({ name: 'B' }), plan({ name: 'A' })]);
    expect(groups.map(({ slug, plans }) => [slug, plans.map(({ name }) => name)])).toEqual([
      ['corvid-c1', ['Transponder 17, QPSK 27.5']],
      ['corvid-c2', ['B', 'A']],
    ]);
  });
});
