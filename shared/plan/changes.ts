import { planFields } from './fields';
import { valueAt, withValue } from './pointer';
import { ruleAt } from './rules';

/** One field that differs between two plans; a value is undefined where the plan leaves the field out. */
export interface Change {
  /** JSON pointer into both plans: a field, a whole loop that only one has, or the stages where their number differs. */
  pointer: string;
  before: unknown;
  after: unknown;
}

const loops = ['/carrier', '/clock'];

/**
 * The fields in which two plans differ. A key that is absent counts as its default, so a
 * plan equals its completed self.
 */
export function planChanges(before: unknown, after: unknown): Change[] {
  const whole = loops.flatMap((loop) => comparedAsOne(before, after, loop));
  const single = fieldPointers(before, after).filter((pointer) => !whole.some((above) => lies(pointer, above)));
  return [...single, ...whole]
    .map((pointer) => ({ pointer, before: settled(before, pointer), after: settled(after, pointer) }))
    .filter((change) => !same(change.before, change.after));
}

function comparedAsOne(before: unknown, after: unknown, loop: string): string[] {
  if (!haveBoth(before, after, loop)) return [loop];
  return countOf(before, `${loop}/stages`) === countOf(after, `${loop}/stages`) ? [] : [`${loop}/stages`];
}

const haveBoth = (before: unknown, after: unknown, pointer: string): boolean =>
  valueAt(before, pointer) !== undefined && valueAt(after, pointer) !== undefined;

const countOf = (plan: unknown, pointer: string): number => {
  const stages = valueAt(plan, pointer);
  return Array.isArray(stages) ? stages.length : 0;
};

const lies = (pointer: string, above: string): boolean => `${pointer}/`.startsWith(`${above}/`);

/** Pointers of all fields, those of stages once for each stage; the list of stages itself is compared by its parts. */
function fieldPointers(before: unknown, after: unknown): string[] {
  const fields = planFields.map(({ pointer }) => pointer).filter((pointer) => !pointer.endsWith('/stages'));
  return ['/name', '/target', ...fields.flatMap((pointer) => expanded(pointer, before, after))];
}

function expanded(pointer: string, before: unknown, after: unknown): string[] {
  const [list = '', rest] = pointer.split('/*');
  if (rest === undefined) return [pointer];
  const length = Math.max(countOf(before, list), countOf(after, list));
  return Array.from({ length }, (_, index) => `${list}/${index}${rest}`);
}

/** The value of a field as the engine takes it: its default when absent, one overflow word when all nodes agree. */
export function settled(plan: unknown, pointer: string): unknown {
  const value = valueAt(plan, pointer) ?? ruleAt(pointer)?.default;
  return pointer.endsWith('/arithmetic/overflow') ? oneOverflow(value) : value;
}

function oneOverflow(value: unknown): unknown {
  if (typeof value !== 'object' || value === null) return value;
  const modes = new Set(Object.values(value));
  return modes.size === 1 ? [...modes][0] : value;
}

/** Equal as JSON, whatever the order of keys. */
const same = (one: unknown, other: unknown): boolean => canonical(one) === canonical(other);

const canonical = (value: unknown): string => JSON.stringify(value, (_, inner: unknown) => sorted(inner)) ?? '';

const sorted = (value: unknown): unknown =>
  typeof value === 'object' && value !== null && !Array.isArray(value)
    ? Object.fromEntries(Object.entries(value).sort(([one], [other]) => (one < other ? -1 : 1)))
    : value;

/** A plan with one side of each change put in. */
export const withChanges = <Plan>(plan: Plan, changes: readonly Change[], side: 'before' | 'after'): Plan =>
  changes.reduce((result, change) => withValue(result, change.pointer, change[side]), plan);
