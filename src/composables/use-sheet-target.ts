import { shallowRef, watch } from 'vue';
import { getTarget, listTargets, type TargetDetail, type TargetSummary } from '../api/targets';
import { ApiError } from '../api/client';
import type { DraftSession } from './use-draft';

/** The targets to choose from, and the one that the draft names, with its register map. */
export function useSheetTarget(draft: DraftSession) {
  const targets = shallowRef<TargetSummary[]>([]);
  const target = shallowRef<TargetDetail | null>(null);

  // The sheet stands without them: a target that cannot be read leaves its registers out.
  void quietly(async () => (targets.value = await listTargets()));
  watch(
    () => draft.plan.value.target,
    async (slug) => {
      const read = slug === undefined ? undefined : await quietly(() => getTarget(slug));
      if (draft.plan.value.target === slug) target.value = read ?? null;
    },
    { immediate: true },
  );
  return { targets, target };
}

const quietly = <T>(work: () => Promise<T>): Promise<T | undefined> =>
  work().catch((error: unknown) => {
    if (error instanceof ApiError) return undefined;
    throw error;
  });
