import { computed, onScopeDispose, ref, shallowRef, watch, type Ref } from 'vue';
import type { Design } from '../../shared/model/design';
import { ApiError, type Fault } from '../api/client';
import { workOut } from '../api/designs';
import type { DraftPlan } from '../api/plans';

/** `none`: nothing worked out yet. `stale`: the plan has a fault. `failed`: the server gave no answer. */
export type Freshness = 'none' | 'fresh' | 'working' | 'stale' | 'failed';

const restMs = 150;
const patienceMs = 300;
const againMs = 5000;

/**
 * What a plan means, kept up to date while it is typed: a request once typing rests, and no answer but that to the
 * newest one counts. The last good design stays until a newer one arrives.
 *
 * @param plan replaced as a whole at each edit
 * @param whole false while the plan lacks or misreads something: then nothing is asked
 * @param first shown as being worked out until the first answer: the design of the last revision
 */
export function useDesign(plan: Ref<DraftPlan>, whole: Ref<boolean>, first: Design | null = null) {
  const design = shallowRef(first);
  const answered = ref(false);
  const faults = shallowRef<readonly Fault[]>([]);
  const unanswered = shallowRef<ApiError | null>(null);
  const late = ref(false);
  const timers = { rest: 0, late: 0, again: 0 };
  let running: AbortController | undefined;

  function stop() {
    Object.values(timers).forEach((timer) => window.clearTimeout(timer));
    running?.abort();
    running = undefined;
    late.value = false;
  }

  async function ask() {
    stop();
    const call = (running = new AbortController());
    timers.late = window.setTimeout(() => (late.value = true), patienceMs);
    const answer = await workOut(plan.value, call.signal).catch((error: unknown) => refusal(error));
    if (running !== call) return;
    stop();
    take(answer);
  }

  function take(answer: Design | ApiError) {
    answered.value = true;
    const refused = answer instanceof ApiError ? answer : null;
    unanswered.value = refused?.faults.length === 0 ? refused : null;
    faults.value = refused?.faults ?? [];
    if (!refused) design.value = answer as Design;
    if (refused?.status === 0) timers.again = window.setTimeout(() => void ask(), againMs);
  }

  watch(
    [plan, whole],
    () => {
      stop();
      if (whole.value) timers.rest = window.setTimeout(() => void ask(), restMs);
    },
    { immediate: true },
  );
  onScopeDispose(stop);

  const state = computed<Freshness>(() => {
    if (!whole.value || faults.value.length > 0) return design.value ? 'stale' : 'none';
    if (late.value || (design.value && !answered.value)) return 'working';
    return unanswered.value ? 'failed' : design.value ? 'fresh' : 'none';
  });
  return { design, answered, faults, state, ask };
}

/** Refusals are answers; a call that was overtaken ends like one without faults and is dropped by its caller. */
function refusal(error: unknown): ApiError {
  if (error instanceof ApiError) return error;
  if (error instanceof DOMException) return new ApiError(0, '/problems/overtaken', 'A newer request took its place.');
  throw error;
}
