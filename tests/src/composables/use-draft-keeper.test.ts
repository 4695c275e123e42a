import { mount, type VueWrapper } from '@vue/test-utils';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { createDraft, type DraftSession } from '../../../src/composables/use-draft';
import { useDraftKeeper } from '../../../src/composables/use-draft-keeper';
import { plan } from '../support/plan';

const fetched = vi.fn();
let draft: DraftSession;
let keeper: ReturnType<typeof useDraftKeeper>;
let wrapper: VueWrapper;

const sent = () => fetched.mock.calls.map(([path, init]) => [init.method, path, init.body && JSON.parse(init.body)]);

beforeEach(() => {
  vi.useFakeTimers();
  fetched.mockReset().mockImplementation(() => Promise.resolve(new Response(null, { status: 204 })));
  vi.stubGlobal('fetch', fetched);
  draft = createDraft();
  draft.open(plan(), plan(), { basedOn: 14, typed: {} });
  wrapper = mount({
    setup() {
      keeper = useDraftKeeper(() => 7, draft);
      return () => null;
    },
  });
});
afterEach(() => {
  wrapper.unmount();
  vi.useRealTimers();
  vi.unstubAllGlobals();
});

describe('useDraftKeeper', () => {
  it('sends edits once typing rests', async () => {
    draft.set('/carrier/delay', 4);
    draft.set('/carrier/delay', 5);
    expect(keeper.kept.value).toBe(false);
    await vi.advanceTimersByTimeAsync(800);
    const { carrier } = plan();
    const body = { basedOn: 14, plan: { ...plan(), carrier: { ...carrier, delay: 5 } }, typed: {} };
    expect(sent()).toEqual([['PUT', '/api/v1/plans/7/draft', body]]);
    expect(keeper.kept.value).toBe(true);
  });

  it('keeps the text of wrong fields too', async () => {
    draft.setText('/signal/rollOff', 'three', 'no number');
    await vi.advanceTimersByTimeAsync(800);
    expect(sent()[0]?.[2]).toMatchObject({ typed: { '/signal/rollOff': 'three' } });
  });

  it('takes the draft away when it equals its revision again', async () => {
    draft.set('/carrier/delay', 4);
    draft.set('/carrier/delay', 3);
    await vi.advanceTimersByTimeAsync(800);
    expect(sent()).toEqual([['DELETE', '/api/v1/plans/7/draft', undefined]]);
  });

  it('sends at once when the page is left', () => {
    draft.set('/carrier/delay', 4);
    wrapper.unmount();
    expect(fetched).toHaveBeenCalledOnce();
  });

  it('sends again what a silent server did not take, and says so meanwhile', async () => {
    fetched.mockImplementationOnce(() => Promise.reject(new TypeError('failed')));
    draft.set('/carrier/delay', 4);
    await vi.advanceTimersByTimeAsync(800);
    expect([keeper.kept.value, keeper.error.value?.status]).toEqual([false, 0]);
    await vi.advanceTimersByTimeAsync(5000);
    expect([keeper.kept.value, keeper.error.value]).toEqual([true, null]);
  });

  it('sends nothing for a person who may only read', async () => {
    draft.locked.value = 'You read this as viewer.';
    draft.set('/carrier/delay', 4);
    await vi.advanceTimersByTimeAsync(800);
    expect(fetched).not.toHaveBeenCalled();
  });
});
