import { mount, type VueWrapper } from '@vue/test-utils';
import { Dark, Quasar } from 'quasar';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { defineComponent, h, nextTick } from 'vue';
import { ApiError } from '../../../src/api/client';
import { useAction } from '../../../src/composables/use-action';
import { useKeys, useSingleKeys } from '../../../src/composables/use-keys';
import { useTheme } from '../../../src/composables/use-theme';
import { dateText, digestText, utcText } from '../../../src/date-text';

describe('useKeys', () => {
  const find = vi.fn();
  const save = vi.fn();
  const page = defineComponent(() => {
    useKeys({ f: find, 'ctrl+s': save });
    return () => h('div', [h('input'), h('button')]);
  });
  let wrapper: VueWrapper;

  beforeEach(() => {
    vi.clearAllMocks();
    useSingleKeys().value = true;
    wrapper = mount(page, { attachTo: document.body });
  });
  afterEach(() => wrapper.unmount());
  const press = (target: string, key: string, ctrlKey = false) =>
    wrapper.get(target).element.dispatchEvent(new KeyboardEvent('keydown', { key, ctrlKey, bubbles: true }));

  it('acts on single keys outside fields only', () => {
    press('button', 'f');
    press('input', 'f');
    expect(find).toHaveBeenCalledTimes(1);
  });

  it('acts on Ctrl with a key everywhere', () => {
    press('input', 's', true);
    expect(save).toHaveBeenCalledTimes(1);
  });

  it('leaves single keys alone once they are switched off', () => {
    useSingleKeys().value = false;
    press('button', 'f');
    press('button', 's', true);
    expect([find.mock.calls.length, save.mock.calls.length]).toEqual([0, 1]);
  });

  it('lets go when the page is left', () => {
    wrapper.unmount();
    document.body.dispatchEvent(new KeyboardEvent('keydown', { key: 'f', bubbles: true }));
    expect(find).not.toHaveBeenCalled();
  });
});

describe('useAction', () => {
  it('keeps a refusal for the page and clears it at the next run', async () => {
    const { busy, error, run } = useAction();
    const refusal = new ApiError(412, '/problems/stale', 'Someone saved before you');
    const refused = run(() => Promise.reject(refusal));
    expect(busy.value).toBe(true);
    await expect(refused).resolves.toBeUndefined();
    expect([busy.value, error.value]).toEqual([false, refusal]);
    await expect(run(() => Promise.resolve(7))).resolves.toBe(7);
    expect(error.value).toBeNull();
  });

  it('throws a defect on and swallows what was called off', async () => {
    const { error, run } = useAction();
    await expect(run(() => Promise.reject(new TypeError('defect')))).rejects.toThrow('defect');
    await expect(run(() => Promise.reject(new DOMException('off', 'AbortError')))).resolves.toBeUndefined();
    expect(error.value).toBeNull();
  });
});

describe('useTheme', () => {
  it('sets the tokens and the Dark plugin alike', async () => {
    mount(
      defineComponent(() => () => h('div')),
      { global: { plugins: [[Quasar, { plugins: { Dark } }]] } },
    );
    const { choose } = useTheme();
    choose('dark');
    await nextTick();
    expect([document.documentElement.dataset.theme, Dark.isActive]).toEqual(['dark', true]);
    choose('light');
    await nextTick();
    expect([document.documentElement.dataset.theme, Dark.isActive]).toEqual(['light', false]);
    choose('auto');
    await nextTick();
    expect([document.documentElement.dataset.theme, Dark.mode]).toEqual([undefined, 'auto']);
    expect(localStorage.getItem('keepstep.theme')).toBe('"auto"');
  });
});

describe('dates and digests', () => {
  it('writes them as the sheet does', () => {
    expect(dateText('2026-11-27T12:00:00Z')).toBe('27 Nov 2026');
    expect(utcText('2026-11-29T09:14:02.511Z')).toBe('2026-11-29 09:14:02 UTC');
    expect(digestText('9f3a51c7e2d80123')).toBe('9f3a 51c7 e2d8');
  });
});
