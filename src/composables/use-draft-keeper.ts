import { onBeforeUnmount, onMounted, ref, shallowRef, watch } from 'vue';
import { ApiError } from '../api/client';
import { putDraft, removeDraft, type Draft } from '../api/plans';
import type { DraftSession } from './use-draft';

const restMs = 800;
const againMs = 5000;

/**
 * Keeps a person's edits on the server: once typing rests, when the page is left or hidden, and again until the server
 * has them. A draft that equals its revision is taken away.
 *
 * @param planId the plan; undefined while it is not stored yet
 */
export function useDraftKeeper(planId: () => number | undefined, draft: DraftSession) {
  const kept = ref(true);
  const error = shallowRef<ApiError | null>(null);
  let timer = 0;

  function later(ms: number) {
    window.clearTimeout(timer);
    timer = window.setTimeout(() => void keep(), ms);
  }

  /** Sends what is not kept yet; never rejects. */
  async function keep() {
    window.clearTimeout(timer);
    const id = planId();
    if (kept.value || id === undefined || draft.locked.value) return;
    const sent = contentOf(draft);
    error.value = await send(id, sent, unchanged(draft));
    kept.value = error.value === null && sent.plan === draft.plan.value && sent.typed === draft.typed.value;
    // A refusal would be refused again; silence and newer typing are sent once more.
    if (error.value?.status === 0) later(againMs);
    else if (!error.value && !kept.value) later(restMs);
  }

  /** Nothing typed so far needs to be sent: after opening, after a save. */
  function settle() {
    window.clearTimeout(timer);
    kept.value = true;
  }

  watch(
    [draft.plan, draft.typed],
    () => {
      kept.value = false;
      later(restMs);
    },
    { flush: 'sync' },
  );
  const hidden = () => document.visibilityState === 'hidden' && void keep();
  onMounted(() => document.addEventListener('visibilitychange', hidden));
  onBeforeUnmount(() => {
    document.removeEventListener('visibilitychange', hidden);
    void keep();
  });
  return { kept, error, keep, settle };
}

const contentOf = ({ basedOn, plan, typed }: DraftSession): Draft => ({
  basedOn: basedOn.value,
  plan: plan.value,
  typed: typed.value,
});

const unchanged = ({ changes, typed }: DraftSession): boolean =>
  changes.value.length === 0 && Object.keys(typed.value).length === 0;

async function send(id: number, draft: Draft, drop: boolean): Promise<ApiError | null> {
  try {
    await (drop ? removeDraft(id) : putDraft(id, draft));
    return null;
  } catch (error) {
    if (error instanceof ApiError) return error;
    throw error;
  }
}
