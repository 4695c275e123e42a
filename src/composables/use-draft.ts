import {
  computed,
  inject,
  provide,
  ref,
  shallowRef,
  type ComputedRef,
  type InjectionKey,
  type Ref,
  type ShallowRef,
} from 'vue';
import { planChanges, settled, withChanges, type Change } from '../../shared/plan/changes';
import { valueAt, withValue } from '../../shared/plan/pointer';
import type { Fault } from '../api/client';
import type { Draft, DraftPlan } from '../api/plans';

/** An act that can be taken back as a whole, unlike a typed digit. */
export interface Undo {
  said: string;
  /** What the act changed: only that is undone, not what was typed after it. */
  changes: Change[];
}

/** The plan under edit, beside the revision that it starts from. */
export interface DraftSession {
  plan: ShallowRef<DraftPlan>;
  base: ShallowRef<DraftPlan | null>;
  /** Number of the revision that the edits start from; 0 before the first one. */
  basedOn: Ref<number>;
  /** “r14”; undefined before the first revision. */
  baseName: ComputedRef<string | undefined>;
  /** Text of the fields that cannot be read, by pointer, and why. */
  typed: ShallowRef<Record<string, string>>;
  misread: ShallowRef<Record<string, string>>;
  /** What the server says of the values. */
  faults: ShallowRef<readonly Fault[]>;
  changes: ComputedRef<Change[]>;
  undo: ShallowRef<Undo | null>;
  /** Grows when unread text was dropped: the form then shows the values anew. */
  texts: Ref<number>;
  /** Why nothing can be typed; undefined when it can. */
  locked: Ref<string | undefined>;
  value(pointer: string): unknown;
  was(pointer: string): unknown;
  edited(pointer: string): boolean;
  /** Why the value at a pointer is wrong, by the server or by its text. */
  fault(pointer: string): string | undefined;
  set(pointer: string, value: unknown): void;
  setText(pointer: string, text: string | undefined, why: string | undefined): void;
  /** Drops what could not be read at a pointer and below it: another value takes its place. */
  forget(pointer: string): void;
  /** Brings back what the revision holds. */
  restore(pointer: string): void;
  /** Changes the plan in one step that `takeBack` undoes. */
  act(said: string, change: (plan: DraftPlan) => DraftPlan): void;
  takeBack(): void;
  open(plan: DraftPlan, base: DraftPlan | null, draft: Pick<Draft, 'basedOn' | 'typed'>): void;
}

const key: InjectionKey<DraftSession> = Symbol('draft');

/** The draft of the sheet that a component stands in. */
export function useDraft(): DraftSession {
  const session = inject(key);
  if (!session) throw new Error('useDraft needs a sheet that provides a draft');
  return session;
}

/** Makes the draft of a sheet and hands it to the parts inside. */
export function provideDraft(): DraftSession {
  const session = createDraft();
  provide(key, session);
  return session;
}

export function createDraft(): DraftSession {
  const plan = shallowRef<DraftPlan>({});
  const base = shallowRef<DraftPlan | null>(null);
  const basedOn = ref(0);
  const typed = shallowRef<Record<string, string>>({});
  const misread = shallowRef<Record<string, string>>({});
  const faults = shallowRef<readonly Fault[]>([]);
  const undo = shallowRef<Undo | null>(null);
  const locked = ref<string>();
  const texts = ref(0);

  const baseName = computed(() => (basedOn.value > 0 ? `r${basedOn.value}` : undefined));
  const changes = computed(() => (base.value ? planChanges(base.value, plan.value) : []));
  const pointers = computed(() => new Set(changes.value.map(({ pointer }) => pointer)));

  function set(pointer: string, value: unknown) {
    plan.value = withValue(plan.value, pointer, value);
  }
  function setText(pointer: string, text: string | undefined, why: string | undefined) {
    typed.value = withEntry(typed.value, pointer, why === undefined ? undefined : text);
    misread.value = withEntry(misread.value, pointer, why);
  }
  function forget(pointer: string) {
    if (Object.keys(typed.value).some((unread) => lies(unread, pointer))) texts.value += 1;
    typed.value = without(typed.value, pointer);
    misread.value = without(misread.value, pointer);
  }
  function act(said: string, change: (plan: DraftPlan) => DraftPlan) {
    const changed = change(plan.value);
    undo.value = { said, changes: planChanges(plan.value, changed) };
    plan.value = changed;
  }
  function takeBack() {
    if (undo.value) plan.value = withChanges(plan.value, undo.value.changes, 'before');
    undo.value = null;
  }
  function restore(pointer: string) {
    forget(pointer);
    set(pointer, valueAt(base.value, pointer));
  }
  function open(opened: DraftPlan, from: DraftPlan | null, draft: Pick<Draft, 'basedOn' | 'typed'>) {
    [plan.value, base.value, basedOn.value, typed.value] = [opened, from, draft.basedOn, draft.typed];
    [misread.value, faults.value, undo.value] = [{}, [], null];
  }

  return {
    ...{ plan, base, basedOn, baseName, typed, misread, faults, changes, undo, locked, texts },
    ...{ set, setText, forget, restore, act, takeBack, open },
    value: (pointer) => settled(plan.value, pointer),
    was: (pointer) => settled(base.value ?? undefined, pointer),
    edited: (pointer) => pointers.value.has(pointer),
    fault: (pointer) => misread.value[pointer] ?? faultAt(faults.value, pointer),
  };
}

function withEntry(entries: Record<string, string>, name: string, text: string | undefined): Record<string, string> {
  const { [name]: _gone, ...rest } = entries;
  return text === undefined ? rest : { ...rest, [name]: text };
}

const lies = (pointer: string, above: string): boolean => `${pointer}/`.startsWith(`${above}/`);

const without = (entries: Record<string, string>, above: string): Record<string, string> =>
  Object.fromEntries(Object.entries(entries).filter(([pointer]) => !lies(pointer, above)));

/** A fault below a pointer (one offset of a mask, a missing key) belongs to it too. */
const faultAt = (faults: readonly Fault[], pointer: string): string | undefined =>
  sentence(faults.find((fault) => lies(fault.pointer, pointer))?.detail);

/** The server's words as a sentence of the form. */
const sentence = (detail: string | undefined): string | undefined =>
  detail && `${detail.charAt(0).toUpperCase()}${detail.slice(1)}${/[.?]$/.test(detail) ? '' : '.'}`;

/** True when a plan holds what the server needs before it can work anything out. */
export const worksOut = (plan: DraftPlan): boolean =>
  valueAt(plan, '/signal/symbolRateBd') !== undefined && (plan.carrier !== undefined || plan.clock !== undefined);
