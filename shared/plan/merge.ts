import { planChanges, withChanges, type Change } from './changes';

/** Two plans that started from one and went apart. */
export interface Divergence<Plan> {
  /** What both started from; undefined when it is not known. */
  base: Plan | undefined;
  mine: Plan;
  theirs: Plan;
}

/** A field in which the two differ: `before` is theirs, `after` mine. */
export interface Conflict extends Change {
  /** Who moved away from the common start; `both` also where the start is not known. */
  changedBy: 'me' | 'them' | 'both';
}

/** The fields in which mine differs from theirs, each with who changed it. */
export function conflictsOf<Plan>({ base, mine, theirs }: Divergence<Plan>): Conflict[] {
  const byMe = base && new Set(planChanges(base, mine).map(({ pointer }) => pointer));
  const byThem = base && new Set(planChanges(base, theirs).map(({ pointer }) => pointer));
  return planChanges(theirs, mine).map((change) => ({ ...change, changedBy: author(change.pointer, byMe, byThem) }));
}

function author(pointer: string, byMe?: Set<string>, byThem?: Set<string>): Conflict['changedBy'] {
  if (!byMe || !byThem) return 'both';
  const [me, them] = [byMe.has(pointer), byThem.has(pointer)];
  return me === them ? 'both' : me ? 'me' : 'them';
}

/**
 * Theirs with the fields of mine that are kept.
 *
 * @param kept pointers of the conflicts in which mine stands
 */
export function merged<Plan>(divergence: Divergence<Plan>, kept: ReadonlySet<string>): Plan {
  const mine = conflictsOf(divergence).filter(({ pointer }) => kept.has(pointer));
  return withChanges(divergence.theirs, mine, 'after');
}
