import { computed, ref, shallowRef, watch, type ComputedRef, type Ref } from 'vue';
import type { Design } from '../../shared/model/design';
import type { RevisionSummary } from '../api/plans';
import { getRevision, type Revision } from '../api/revisions';
import type { DraftSession } from './use-draft';
import { useAction } from './use-action';

export interface ComparedState {
  name: string;
  plan: unknown;
  design: Design | null;
}

/** 0 stands for the draft, any other number for that revision. */
type Choice = Ref<number>;

/**
 * Two states of a plan to be compared: the last revision with the draft while there are edits, else the last two
 * revisions. Revisions are read when they are first chosen.
 */
export function useCompare(
  revisions: Ref<readonly RevisionSummary[]>,
  head: Ref<Revision | null>,
  draft: DraftSession,
  design: Ref<Design | null>,
) {
  const read = shallowRef<ReadonlyMap<number, Revision>>(new Map());
  const { error, run } = useAction();
  const from: Choice = ref(0);
  const to: Choice = ref(0);

  const edited = computed(() => draft.changes.value.length > 0);
  watch(
    [revisions, edited],
    () => {
      const [newest, second] = revisions.value;
      to.value = edited.value ? 0 : (newest?.number ?? 0);
      from.value = (edited.value ? newest : second)?.number ?? 0;
    },
    { immediate: true },
  );
  watch(head, (revision) => revision && remember(revision), { immediate: true });
  watch([from, to], ([one, other]) => [one, other].forEach(load), { immediate: true });

  function remember(revision: Revision) {
    read.value = new Map(read.value).set(revision.number, revision);
  }
  function load(number: number) {
    const wanted = revisions.value.find((revision) => revision.number === number);
    if (wanted && !read.value.has(number)) void run(async () => remember(await getRevision(wanted.id)));
  }

  const side = (choice: Choice): ComputedRef<ComparedState | null> =>
    computed(() => {
      if (choice.value === 0) return { name: 'draft', plan: draft.plan.value, design: design.value };
      const revision = read.value.get(choice.value);
      return revision ? { name: `r${revision.number}`, plan: revision.description, design: revision.design } : null;
    });
  return { from, to, before: side(from), after: side(to), error };
}
