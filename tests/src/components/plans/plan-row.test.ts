import { mount, RouterLinkStub } from '@vue/test-utils';
import { describe, expect, it } from 'vitest';
import type { PlanSummary } from '../../../../src/api/plans';
import PlanRow from '../../../../src/components/plans/PlanRow.vue';
import { plan } from '../../support/plan-summary';

const row = (more: Partial<PlanSummary> = {}) =>
  mount(PlanRow, {
    props: { plan: plan(more), copyable: false, rateMost: 2 },
    global: { stubs: { RouterLink: RouterLinkStub } },
  });

describe('PlanRow', () => {
  it('shows rate, bandwidth and margin with their units and digits', () => {
    const cells = row()
      .findAll('td')
      .map((cell) => cell.text());
    expect(cells.slice(0, 4)).toEqual(['QPSK', '27.5 MBd', '0.001010', '64.9°']);
  });

  it('says unstable instead of a bandwidth, and draws no step', () => {
    const { head } = plan();
    const unstable = row({ head: { ...head!, summary: { ...head!.summary!, noiseBandwidth: null } } });
    expect(unstable.text()).toContain('unstable');
    expect(unstable.find('td.step svg').exists()).toBe(false);
  });

  it('names the revision that a release holds where it is not the newest', () => {
    expect(row({ release: { version: '2.3.0', state: 'frozen', revisionNumber: 11 } }).text()).toContain(
      '2.3.0 frozen, r11',
    );
    expect(row().find('td.rel').text()).toBe('2.4.0 in review');
    expect(row({ release: null }).find('td.rel').text()).toBe('no release');
  });

  it('is not a pass before the first revision', () => {
    const first = row({ head: null, hasDraft: true }).text();
    expect(first).toContain('no revision');
    expect(first).toContain('draft open');
    expect(first).not.toContain('pass');
  });
});
