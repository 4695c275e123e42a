import { computed, ref, shallowRef, watch } from 'vue';
import { useRouter } from 'vue-router';
import { ApiError } from '../api/client';
import { createPlan, getPlan, type DraftPlan, type PlanSheet, type RevisionSummary } from '../api/plans';
import { getRevision, listRevisions, saveRevision, type Revision, type StalePlan } from '../api/revisions';
import { useAction } from './use-action';
import type { DraftSession } from './use-draft';
import { usePlanImport } from './use-plan-import';
import { useDraftKeeper } from './use-draft-keeper';
import { firstPlan, forgetNewPlan, keepNewPlan } from './first-plan';

/** A save that somebody else was faster with: their revision, and the description that both started from. */
export interface Divergence {
  head: RevisionSummary;
  version: number;
  theirs: DraftPlan;
  base: DraftPlan | undefined;
}

/**
 * The plan behind a sheet: opens it with the person's draft, saves revisions over exactly the version that was read,
 * and says when somebody else was faster. Nothing typed is lost on any way.
 *
 * @param id the plan; undefined for one that is not stored yet
 */
export function usePlanSheet(id: () => number | undefined, draft: DraftSession) {
  const router = useRouter();
  const sheet = shallowRef<PlanSheet | null>(null);
  const revisions = shallowRef<RevisionSummary[]>([]);
  const head = shallowRef<Revision | null>(null);
  const divergence = shallowRef<Divergence | null>(null);
  const loading = useAction();
  const saving = useAction();
  /** Grows whenever another description is opened in the form; 0 until the first one. */
  const opened = ref(0);
  const restored = ref(false);
  const upload = usePlanImport();
  const keeper = useDraftKeeper(id, draft);
  const missing = computed(() => loading.error.value?.status === 404);

  const open = () =>
    loading.run(async () => {
      const plan = id();
      await (plan === undefined ? openNew() : openStored(plan));
      keeper.settle();
      opened.value += 1;
    });

  async function openNew() {
    const first = await firstPlan(router.currentRoute.value.query);
    [sheet.value, revisions.value, head.value, divergence.value] = [null, [], null, null];
    [restored.value, untouched] = [first.restored, first.plan];
    draft.open(first.plan, null, { basedOn: 0, typed: {} });
  }
  let untouched: DraftPlan | undefined;
  watch(draft.plan, (typed) => {
    if (id() === undefined && typed !== untouched) keepNewPlan(typed);
  });
  /** Puts an uploaded description into the form of a new plan. */
  async function openFile(file: File) {
    await upload.take(file);
    if (!upload.error.value) await open();
  }
  function startOver() {
    forgetNewPlan();
    void open();
  }

  async function openStored(plan: number) {
    const [read, saved] = await Promise.all([getPlan(plan), listRevisions(plan)]);
    const newest = read.head && (await getRevision(read.head.id));
    const started = read.draft && (await startOf(read, saved));
    [sheet.value, revisions.value, head.value] = [read, saved, newest];
    divergence.value = started ? { ...started, version: read.version } : null;
    const base = started ? (started.base ?? read.description) : read.description;
    const basedOn = read.draft?.basedOn ?? read.head?.number ?? 0;
    draft.open(read.draft?.plan ?? read.description, base, { basedOn, typed: read.draft?.typed ?? {} });
  }

  /** Stores a new plan; resolves once its own sheet has taken this one's place. */
  const create = () =>
    saving.run(async () => {
      const { id: made } = await createPlan(draft.plan.value);
      forgetNewPlan();
      await router.replace({ name: 'plan', params: { id: made } });
    });

  const save = (note: string) =>
    saving.run(async () => {
      const plan = sheet.value!;
      await keeper.keep();
      const saved = await saveRevision(plan.id, plan.version, { plan: draft.plan.value, note }).catch(takeStale);
      if (saved) await open();
      return saved;
    });

  function takeStale(error: unknown): undefined {
    if (!(error instanceof ApiError) || error.status !== 412) throw error;
    const { head: newer, version, description } = error.problem.current as StalePlan;
    divergence.value = { head: newer, version, theirs: description, base: draft.base.value ?? undefined };
  }

  /** Goes on from the newer revision with the fields that were kept; what was typed is in `plan` already. */
  async function rebase(plan: DraftPlan) {
    const { head: newer, version, theirs } = divergence.value!;
    sheet.value = { ...sheet.value!, version, head: newer };
    draft.open(plan, theirs, { basedOn: newer.number, typed: draft.typed.value });
    divergence.value = null;
    opened.value += 1;
    await keeper.keep();
    const [saved, newest] = await Promise.all([listRevisions(sheet.value.id), getRevision(newer.id)]);
    [revisions.value, head.value] = [saved, newest];
  }

  watch(id, () => void open(), { immediate: true });
  return {
    ...{ sheet, revisions, head, divergence, missing, opened, restored },
    ...{ loading, saving, upload, keeper, open, openFile, startOver, create, save, rebase },
  };
}

export type PlanSheetSession = ReturnType<typeof usePlanSheet>;

/** Where a draft that starts from an older revision went apart; null when it starts from the newest. */
async function startOf(
  { draft, head, description }: PlanSheet,
  revisions: readonly RevisionSummary[],
): Promise<Omit<Divergence, 'version'> | null> {
  if (!draft || !head || draft.basedOn === head.number) return null;
  const start = revisions.find(({ number }) => number === draft.basedOn);
  const base = start && (await getRevision(start.id)).description;
  return { head, theirs: description, base };
}
