import { mount } from '@vue/test-utils';
import { describe, expect, it } from 'vitest';
import type { Solution } from '../../../../shared/model/design';
import SolutionTable from '../../../../src/components/plan/SolutionTable.vue';

const change = { pointer: '/carrier/stages/1/noiseBandwidth', value: 0.011, label: 'Set 2.7 of track to 0.011' };
const margin: Solution = {
  slug: 'margin.widest',
  loop: 'carrier',
  stage: 'track',
  title: 'widest BnT of track with this delay',
  limit: '/limits/phaseMarginDeg',
  limitText: 'Phase margin, min 45°',
  value: 0.0112,
  unit: '',
  sense: 'max',
  present: 0.004,
  note: null,
  estimate: false,
  change,
};
const none: Solution = { ...margin, slug: 'jitter.widest', value: null, note: 'No BnT meets it.', change: null };

const mounted = (locked: boolean) => mount(SolutionTable, { props: { solutions: [margin, none], locked } });

describe('SolutionTable', () => {
  it('says what to take, what is there now, and why there is none', () => {
    const text = mounted(false).text();
    expect(text).toContain('Phase margin, min 45°');
    expect(text).toContain('at most 0.0112');
    expect(text).toContain('0.004');
    expect(text).toContain('No BnT meets it.');
  });

  it('hands on the edit of its button', async () => {
    const table = mounted(false);
    await table.get('button').trigger('click');
    expect(table.emitted('apply')).toEqual([[change]]);
    expect(table.get('button').text()).toBe('Set 2.7 of track to 0.011');
  });

  it('offers no edit while the form is locked', () => {
    expect(mounted(true).find('button').exists()).toBe(false);
  });
});
