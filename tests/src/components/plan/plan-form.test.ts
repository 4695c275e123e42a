import { mount, type VueWrapper } from '@vue/test-utils';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { defineComponent, h, nextTick, type Component } from 'vue';
import ConflictPanel from '../../../../src/components/plan/ConflictPanel.vue';
import FindingList from '../../../../src/components/plan/FindingList.vue';
import PlanForm from '../../../../src/components/plan/PlanForm.vue';
import { examplePlan } from '../../../../src/components/plans/example-plan';
import { provideDraft, type DraftSession } from '../../../../src/composables/use-draft';
import { withValue } from '../../../../shared/plan/pointer';
import { design, plan } from '../../support/plan';

let draft: DraftSession;
let wrapper: VueWrapper;

/** Mounts a part of the sheet on the draft of r14. */
function on(part: Component, props: Record<string, unknown>, opened = plan()) {
  const host = defineComponent(() => {
    draft = provideDraft();
    draft.open(opened, plan(), { basedOn: 14, typed: {} });
    return () => h(part, props);
  });
  wrapper = mount(host, { attachTo: document.body, global: { stubs: { RouterLink: true } } });
  return wrapper;
}
beforeEach(() => localStorage.clear());
afterEach(() => wrapper.unmount());

const field = (pointer: string) => wrapper.get(`[data-pointer="${pointer}"]`);

describe('PlanForm', () => {
  const form = () => on(PlanForm, { targets: [], fresh: false });

  it('takes a typed quantity in any unit and marks the edit', async () => {
    form();
    const limit = field('/carrier/arithmetic/integratorLimitHz');
    await limit.get('input').setValue('70 kHz');
    expect(draft.value('/carrier/arithmetic/integratorLimitHz')).toBe(70e3);
    expect(limit.classes()).toContain('ed');
    expect(limit.text()).toContain('was empty in r14');
    await limit.get('button.no').trigger('click');
    expect(draft.changes.value).toEqual([]);
  });

  it('keeps a text that cannot be read, and the value as it was', async () => {
    form();
    await field('/signal/rollOff').get('input').setValue('seven');
    expect(draft.typed.value).toEqual({ '/signal/rollOff': 'seven' });
    expect(draft.value('/signal/rollOff')).toBe(0.35);
  });

  it('opens with the text that could not be read', () => {
    form();
    wrapper.unmount();
    const host = defineComponent(() => {
      draft = provideDraft();
      draft.open(plan(), plan(), { basedOn: 14, typed: { '/signal/rollOff': 'seven' } });
      return () => h(PlanForm, { targets: [], fresh: false });
    });
    wrapper = mount(host);
    expect((field('/signal/rollOff').get('input').element as HTMLInputElement).value).toBe('seven');
    expect(draft.fault('/signal/rollOff')).toContain('not a number');
  });

  it('shows a full scale as the power of two that it is', async () => {
    form();
    const scale = field('/carrier/arithmetic/errorFullScaleLog2').get('input');
    expect((scale.element as HTMLInputElement).value).toBe('±2');
    await scale.setValue('8');
    expect(draft.value('/carrier/arithmetic/errorFullScaleLog2')).toBe(3);
    await scale.setValue('3');
    expect(draft.fault('/carrier/arithmetic/errorFullScaleLog2')).toContain('2 or 4');
  });

  it('adds and takes out a loop', async () => {
    form();
    const out = wrapper.findAll('button').find((button) => button.text() === 'Take the clock loop out')!;
    await out.trigger('click');
    expect(draft.plan.value.clock).toBeUndefined();
    draft.takeBack();
    expect(draft.changes.value).toEqual([]);
  });

  it('takes a bandwidth in Hz: 20 kHz of 27.5 MBd', async () => {
    form();
    await field('/carrier/stages/1/noiseBandwidth').setValue('20 kHz');
    expect(draft.value('/carrier/stages/1/noiseBandwidth')).toBeCloseTo(20 / 27500, 12);
  });

  it('rules out the detectors that the modulation has no use for', () => {
    form();
    const options = field('/carrier/detector').findAll('option');
    const shut = options.filter((option) => option.attributes('disabled') !== undefined).map((option) => option.text());
    expect(shut).toEqual(['Costas']);
  });

  it('shuts every control for a person who may only read', async () => {
    form();
    draft.locked.value = 'You read this as viewer.';
    await nextTick();
    expect(wrapper.findAll('input, select').filter((each) => each.attributes('disabled') === undefined)).toEqual([]);
  });
});

describe('FindingList', () => {
  it('types a remedy into the form, takes it back, and saves nothing', async () => {
    const fetched = vi.fn();
    vi.stubGlobal('fetch', fetched);
    const narrow = withValue(examplePlan('corvid-c2'), '/carrier/arithmetic', { integratorLimitHz: 70e3 });
    on(FindingList, { findings: design(narrow).findings, stale: undefined }, narrow);
    const remedy = wrapper.get('.do button');
    expect(remedy.text()).toBe('Set 2.18 to ±86 kHz');
    await remedy.trigger('click');
    expect(draft.value('/carrier/arithmetic/integratorLimitHz')).toBe(86e3);
    draft.takeBack();
    expect(draft.value('/carrier/arithmetic/integratorLimitHz')).toBe(70e3);
    expect(fetched).not.toHaveBeenCalled();
    vi.unstubAllGlobals();
  });

  it('says beside the button what is left to do after it', () => {
    const arithmetic = { integratorLimitHz: 70e3, integratorBits: 30 };
    const narrow = withValue(examplePlan('corvid-c2'), '/carrier/arithmetic', arithmetic);
    const [short] = design(narrow).findings.filter(({ slug }) => slug === 'acquisition.integrator-range');
    on(FindingList, { findings: [short], stale: undefined }, narrow);
    expect(wrapper.get('.do').text()).toBe('Set 2.14 to 33 bitsthen 2.18 to ±86 kHz.');
  });
});

describe('ConflictPanel', () => {
  const mine = withValue(withValue(plan(), '/signal/rollOff', 0.2), '/carrier/delay', 2);
  const theirs = withValue(withValue(plan(), '/signal/rollOff', 0.25), '/signal/esN0Db', 8);
  const head = { number: 15, by: { id: 2, name: 'T. Okafor' }, savedAt: '2026-11-29T09:14:00Z', note: '' };
  const divergence = { head, version: 15, theirs, base: plan() };

  it('shows both sides field by field and goes on with what stands', async () => {
    const rebase = vi.fn();
    on(ConflictPanel, { divergence, onRebase: rebase }, mine);
    const rows = wrapper.findAll('tbody tr').map((row) => row.text().replace(/\s+/g, ' '));
    expect(rows).toEqual([
      '1.4 Roll-off αboth of you 0.25 0.20',
      '1.5 Es/N0 at workthey 8 dB 10 dB',
      '2.4 Extra delayyou 3 updates 2 updates',
    ]);
    await wrapper.get('input[aria-label="Roll-off α: r15"]').trigger('change');
    await wrapper.get('.b.p').trigger('click');
    expect(rebase.mock.calls[0]?.[0]).toEqual(withValue(theirs, '/carrier/delay', 2));
  });

  it('does not let go of what was typed before, nor while the panel stands', async () => {
    const rebase = vi.fn();
    on(ConflictPanel, { divergence, onRebase: rebase }, mine);
    draft.set('/limits/phaseMarginDeg', 50);
    await nextTick();
    await wrapper.get('.b.p').trigger('click');
    expect(rebase.mock.calls[0]?.[0]).toMatchObject({ limits: { phaseMarginDeg: 50 }, signal: { rollOff: 0.2 } });
  });
});
