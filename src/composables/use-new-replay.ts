import { computed, ref, shallowRef, watch } from 'vue';
import { listPlans, type PlanSummary, type RevisionSummary } from '../api/plans';
import { createReplay, getReplay } from '../api/replays';
import { getRevision, listRevisions, type Revision } from '../api/revisions';
import { checkOf, formOf, suggestedForm, type CheckForm } from '../components/replays/check-form';
import { useAction } from './use-action';

export interface ReplayOrigin {
  /** Revision to start from. */
  revisionId?: number | undefined;
  /** Replay whose check is taken over. */
  replayId?: number | undefined;
  /** Trials instead of those of that check. */
  trials?: number | undefined;
}

/** Chooses a revision, proposes the check that its plan asks for, and starts the replay. */
export function useNewReplay(origin: ReplayOrigin) {
  const { busy, error, run } = useAction();
  const plans = shallowRef<PlanSummary[]>();
  const revisions = shallowRef<RevisionSummary[]>([]);
  const revision = shallowRef<Revision>();
  const planId = ref('');
  const revisionId = ref('');
  const form = ref<CheckForm>();
  const check = computed(() => form.value && checkOf(form.value));

  const load = () =>
    run(async () => {
      const all = await listPlans();
      plans.value = all.filter((plan) => plan.head !== null);
      const copied = origin.replayId ? await getReplay(origin.replayId) : undefined;
      if (copied) form.value = { ...formOf(copied.check), ...(origin.trials && { trials: origin.trials }) };
      await choose(copied?.revision.id ?? origin.revisionId ?? plans.value[0]?.head?.id);
    });

  async function choose(id: number | undefined): Promise<void> {
    if (id === undefined) return;
    const chosen = await getRevision(id);
    planId.value = String(chosen.plan.id);
    revisionId.value = String(id);
    revision.value = chosen;
    form.value ??= suggestedForm(chosen.description);
  }

  watch(planId, async (id) => {
    revisions.value = [];
    const read = await run(() => listRevisions(Number(id)));
    if (!read || planId.value !== id) return;
    revisions.value = [...read].sort((a, b) => b.number - a.number);
    if (!revisions.value.some((each) => String(each.id) === revisionId.value)) {
      revisionId.value = String(revisions.value[0]?.id ?? '');
    }
  });

  watch(revisionId, async (id) => {
    if (!id || Number(id) === revision.value?.id) return;
    const read = await run(() => getRevision(Number(id)));
    if (!read || revisionId.value !== id) return;
    const newPlan = read.plan.id !== revision.value?.plan.id;
    revision.value = read;
    if (newPlan) form.value = suggestedForm(read.description);
  });

  const start = () =>
    run(async () => {
      const chosen = check.value;
      return chosen && createReplay(Number(revisionId.value), chosen);
    });

  return { plans, revisions, revision, planId, revisionId, form, check, busy, error, load, start };
}
