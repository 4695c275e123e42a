import { computed, shallowRef, watch } from 'vue';
import { stableOrder } from '../../shared/stable-order';
import type { RegisterMap } from '../../shared/model/register-map';
import type { TargetBody } from '../../shared/model/target';
import { changedRegisters, rebaseMap } from '../../shared/registers/map-changes';
import { getTarget, saveTarget, type TargetDetail } from '../api/targets';
import { detailsOf } from '../components/target/target-details';
import { useAction } from './use-action';
import { remembered } from './use-remembered';

/** Edits that are not saved yet, with the state of the target that they start from. */
interface KeptEdits {
  base: TargetDetail;
  body: TargetBody;
}

/** An act that can be taken back as a whole, unlike a typed digit. */
interface Undo {
  said: string;
  body: TargetBody;
}

export const bodyOf = (target: TargetDetail): TargetBody => ({ ...detailsOf(target), registerMap: target.registerMap });

const textOf = (body: TargetBody): string => JSON.stringify(stableOrder(body));

/**
 * One target under edit. Edits are kept in this browser until they are saved or thrown away; a save that somebody else
 * overtook is refused, loses nothing, and leaves both states to choose from.
 */
export function useTargetSheet(slug: string) {
  const { busy, error, run } = useAction();
  const base = shallowRef<TargetDetail>();
  const body = shallowRef<TargetBody>();
  /** What somebody else has saved since the edits began. */
  const newer = shallowRef<TargetDetail>();
  const undo = shallowRef<Undo>();
  const kept = remembered<KeptEdits | null>(`target.${slug}`, null);

  const edited = computed(() => !!base.value && !!body.value && textOf(bodyOf(base.value)) !== textOf(body.value));
  const changes = computed(() =>
    base.value && body.value ? changedRegisters(base.value.registerMap, body.value.registerMap) : [],
  );
  watch([base, body], () => {
    if (base.value && body.value) kept.write(edited.value ? { base: base.value, body: body.value } : null);
  });

  function open(target: TargetDetail, edits: TargetBody = bodyOf(target)): void {
    base.value = target;
    body.value = edits;
    newer.value = undefined;
    undo.value = undefined;
  }

  const load = () =>
    run(async () => {
      const target = await getTarget(slug);
      const edits = kept.read();
      if (!edits) return open(target);
      open(edits.base, edits.body);
      if (target.version !== edits.base.version) newer.value = target;
    });

  /** @param said what was done, for an act that can be taken back */
  function edit(change: Partial<TargetBody>, said?: string): void {
    if (!body.value) return;
    undo.value = said === undefined ? undefined : { said, body: body.value };
    body.value = { ...body.value, ...change };
  }
  const editMap = (registerMap: RegisterMap, said?: string) => edit({ registerMap }, said);

  function drop(): void {
    if (base.value) edit(bodyOf(base.value), 'Your edits are gone.');
  }
  function takeBack(): void {
    if (undo.value) body.value = undo.value.body;
    undo.value = undefined;
  }

  async function save(): Promise<boolean> {
    if (!base.value || !body.value) return false;
    const { version } = base.value;
    const sent = body.value;
    const saved = await run(() => saveTarget(version, sent));
    if (saved) open(saved);
    else if (error.value?.status === 412) newer.value = await getTarget(slug).catch(() => undefined);
    return saved !== undefined;
  }

  function takeTheirs(): void {
    if (newer.value) open(newer.value);
    error.value = null;
  }
  /** Carries the edits over to the newer state, register by register. */
  function rebase(): void {
    if (!base.value || !body.value || !newer.value) return;
    const registerMap = rebaseMap(base.value.registerMap, body.value.registerMap, newer.value.registerMap);
    open(newer.value, { ...bodyOf(newer.value), ...ownDetails(base.value, body.value), registerMap });
    error.value = null;
  }

  return {
    base,
    body,
    newer,
    undo,
    edited,
    changes,
    busy,
    error,
    load,
    edit,
    editMap,
    drop,
    takeBack,
    save,
    takeTheirs,
    rebase,
  };
}

export type TargetSheet = ReturnType<typeof useTargetSheet>;

/** Details of the target that the edits changed; the others follow the newer state. */
function ownDetails(base: TargetDetail, body: TargetBody): Partial<TargetBody> {
  const keys = ['name', 'loopClockHz', 'cPrefix', 'baseAddress'] as const;
  return Object.fromEntries(keys.filter((key) => base[key] !== body[key]).map((key) => [key, body[key]]));
}
