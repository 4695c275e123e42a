import { mount } from '@vue/test-utils';
import { Quasar } from 'quasar';
import { afterEach, describe, expect, it } from 'vitest';
import { nextTick } from 'vue';
import FreezeDialog from '../../../../src/components/releases/FreezeDialog.vue';
import FreezePanel from '../../../../src/components/releases/FreezePanel.vue';
import { readOnlyReason } from '../../../../src/components/releases/release-facts';
import { release } from '../../support/release';

const global = { plugins: [Quasar] };
const button = (text: string) =>
  [...document.querySelectorAll('button')].find((each) => each.textContent?.trim() === text)!;

async function type(text: string): Promise<void> {
  const field = document.querySelector<HTMLInputElement>('[role=dialog] input, .dlg input')!;
  field.value = text;
  field.dispatchEvent(new Event('input'));
  await nextTick();
}

describe('FreezeDialog', () => {
  afterEach(() => void (document.body.innerHTML = ''));

  it.each(['', '2.4', '2.4.0 ', '2.4.1', 'v2.4.0'])('stays shut for “%s”', async (typed) => {
    mount(FreezeDialog, {
      props: { modelValue: true, release: release(), fileCount: 3 },
      global,
      attachTo: document.body,
    });
    await nextTick();
    await type(typed);
    expect(button('Freeze 2.4.0').disabled).toBe(true);
  });

  it('freezes on an exact match and says what it fixes', async () => {
    const props = { modelValue: true, release: release(), fileCount: 3 };
    const dialog = mount(FreezeDialog, { props, global, attachTo: document.body });
    await nextTick();
    expect(document.body.textContent).toContain('dl_qpsk Transponder 17, QPSK 27.5, r14');
    await type('2.4.0');
    button('Freeze 2.4.0').click();
    expect(dialog.emitted('freeze')).toEqual([['2.4.0']]);
  });
});

describe('FreezePanel', () => {
  const text = (manages: boolean, more = {}) =>
    mount(FreezePanel, { props: { release: release(more), manages, busy: false }, global }).text();
  const shut = { state: 'shut', text: 'dl_qpsk r14 has 1 failing finding.' };

  it('counts two files for each entry and the manifest', () => {
    expect(text(true)).toContain('Writes 3 files');
  });

  it('says beside the button what it waits for', () => {
    expect(text(true, { gates: [shut] })).toContain('Waits for 1 gate.');
    expect(text(true, { gates: [shut, { ...shut, text: 'another' }] })).toContain('Waits for 2 gates.');
    expect(text(false)).toContain('Release managers freeze.');
  });
});

describe('readOnlyReason', () => {
  it('lets only release managers change a draft, and nobody a frozen release', () => {
    expect(readOnlyReason(release(), true)).toBeUndefined();
    expect(readOnlyReason(release(), false)).toBe('release managers change it');
    expect(readOnlyReason(release({ state: 'frozen' }), true)).toBe('fixed: the release is frozen');
  });
});
