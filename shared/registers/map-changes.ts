import { stableOrder } from '../stable-order';
import type { Register, RegisterMap } from '../model/register-map';

export interface RegisterChange {
  /** Name of the register; the new one where it was renamed. */
  name: string;
  kind: 'added' | 'changed' | 'removed';
}

const textOf = (register: Register | undefined): string => JSON.stringify(stableOrder(register));
const byName = ({ registers }: RegisterMap) => new Map(registers.map((register) => [register.name, register]));

/** Registers that differ between two maps, in the order of the later one, removed ones last. */
export function changedRegisters(before: RegisterMap, after: RegisterMap): RegisterChange[] {
  const old = byName(before);
  const now = byName(after);
  const changed = after.registers.flatMap(({ name }): RegisterChange[] => {
    if (!old.has(name)) return [{ name, kind: 'added' }];
    return textOf(old.get(name)) === textOf(now.get(name)) ? [] : [{ name, kind: 'changed' }];
  });
  const removed = before.registers.filter(({ name }) => !now.has(name));
  return [...changed, ...removed.map(({ name }): RegisterChange => ({ name, kind: 'removed' }))];
}

/**
 * Carries edits over to a newer map, register by register: what only the newer map changed follows it, what the edits
 * changed stands.
 *
 * @param base the map that the edits start from
 */
export function rebaseMap(base: RegisterMap, mine: RegisterMap, newer: RegisterMap): RegisterMap {
  const own = new Set(changedRegisters(base, mine).map(({ name }) => name));
  const edited = byName(mine);
  const known = byName(newer);
  const kept = newer.registers.flatMap((register) =>
    own.has(register.name) ? (edited.get(register.name) ?? []) : register,
  );
  const added = mine.registers.filter(({ name }) => own.has(name) && !known.has(name));
  return { ...newer, registers: [...kept, ...added] };
}
