import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { effectScope, nextTick, ref, shallowRef, type EffectScope } from 'vue';
import { useDesign } from '../../../src/composables/use-design';
import type { DraftPlan } from '../../../src/api/plans';
import { plan } from '../support/plan';

/** One call that waits for its answer. */
interface Waiting {
  asked: { plan: DraftPlan };
  answer(status: number, body: unknown): Promise<void>;
  signal: AbortSignal;
}

let calls: Waiting[];
let scope: EffectScope;
const typed = shallowRef<DraftPlan>({});
const whole = ref(true);
let live: ReturnType<typeof useDesign>;

const settle = () => vi.advanceTimersByTimeAsync(0);

beforeEach(() => {
  vi.useFakeTimers();
  calls = [];
  vi.stubGlobal('fetch', (_path: string, init: RequestInit) => {
    return new Promise<Response>((resolve, reject) => {
      init.signal?.addEventListener('abort', () => reject(new DOMException('', 'AbortError')));
      calls.push({
        asked: JSON.parse(init.body as string),
        signal: init.signal!,
        answer: async (status, body) => {
          resolve(new Response(JSON.stringify(body), { status }));
          await settle();
        },
      });
    });
  });
  typed.value = plan();
  whole.value = true;
  scope = effectScope();
  live = scope.run(() => useDesign(typed, whole))!;
});
afterEach(() => {
  scope.stop();
  vi.useRealTimers();
  vi.unstubAllGlobals();
});

const named = (name: string) => ({ design: { findings: [], plan: { name } } });
async function type(name: string) {
  typed.value = { ...typed.value, name };
  await nextTick();
}

describe('useDesign', () => {
  it('asks once typing rests, and only for what was typed last', async () => {
    await type('one');
    await vi.advanceTimersByTimeAsync(149);
    await type('two');
    await vi.advanceTimersByTimeAsync(149);
    expect(calls).toHaveLength(0);
    await vi.advanceTimersByTimeAsync(1);
    expect(calls.map(({ asked }) => asked.plan.name)).toEqual(['two']);
  });

  it('drops the answer to an older request', async () => {
    await vi.advanceTimersByTimeAsync(150);
    await type('newer');
    await vi.advanceTimersByTimeAsync(150);
    expect(calls[0]?.signal.aborted).toBe(true);
    await calls[1]!.answer(200, named('newer'));
    await calls[0]!.answer(200, named('older'));
    expect(live.design.value?.plan.name).toBe('newer');
    expect(live.state.value).toBe('fresh');
  });

  it('says working only after 300 ms, over the numbers of before', async () => {
    await vi.advanceTimersByTimeAsync(150);
    await calls[0]!.answer(200, named('before'));
    await type('after');
    await vi.advanceTimersByTimeAsync(150 + 299);
    expect(live.state.value).toBe('fresh');
    await vi.advanceTimersByTimeAsync(1);
    expect(live.state.value).toBe('working');
    expect(live.design.value?.plan.name).toBe('before');
  });

  it('keeps the last design and names the fields when the server refuses', async () => {
    await vi.advanceTimersByTimeAsync(150);
    await calls[0]!.answer(200, named('before'));
    await type('wrong');
    await vi.advanceTimersByTimeAsync(150);
    const faults = [{ pointer: '/carrier/delay', detail: 'must be at most 64' }];
    await calls[1]!.answer(422, { title: 'One value cannot be accepted.', faults });
    expect(live.state.value).toBe('stale');
    expect(live.faults.value).toEqual(faults);
    expect(live.design.value?.plan.name).toBe('before');
  });

  it('asks nothing while the plan is not whole', async () => {
    whole.value = false;
    await nextTick();
    await vi.advanceTimersByTimeAsync(1000);
    expect(calls).toHaveLength(0);
    expect(live.state.value).toBe('none');
  });

  it('asks again by itself when the server was silent', async () => {
    await vi.advanceTimersByTimeAsync(150);
    vi.stubGlobal('fetch', () => Promise.reject(new TypeError('failed')));
    await type('again');
    await vi.advanceTimersByTimeAsync(150);
    expect(live.state.value).toBe('failed');
    const fetched = vi.fn(() => Promise.resolve(new Response(JSON.stringify(named('back')))));
    vi.stubGlobal('fetch', fetched);
    await vi.advanceTimersByTimeAsync(5000);
    expect(fetched).toHaveBeenCalledOnce();
    expect(live.state.value).toBe('fresh');
  });
});
