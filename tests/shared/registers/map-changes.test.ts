import { describe, expect, it } from 'vitest';
import type { Register, RegisterMap } from '../../../shared/model/register-map';
import { changedRegisters, rebaseMap } from '../../../shared/registers/map-changes';

const register = (name: string, offset: number): Register => ({ name, offset, fields: [] });
const map = (...registers: Register[]): RegisterMap => ({ registers });
const base = map(register('A', 0), register('B', 4), register('C', 8));

describe('changedRegisters', () => {
  it('names what differs, removed registers last', () => {
    expect(changedRegisters(base, map(register('D', 12), register('A', 0), register('C', 16)))).toEqual([
      { name: 'D', kind: 'added' },
      { name: 'C', kind: 'changed' },
      { name: 'B', kind: 'removed' },
    ]);
  });

  it('does not take another order of the keys for a change', () => {
    expect(changedRegisters(base, map({ fields: [], offset: 0, name: 'A' }, ...base.registers.slice(1)))).toEqual([]);
  });
});

describe('rebaseMap', () => {
  it('keeps the edits and takes over what only the newer map changed', () => {
    const mine = map(register('A', 0), register('B', 40), register('D', 12));
    const newer = map(register('A', 100), register('B', 44), register('C', 8), register('E', 16));
    expect(rebaseMap(base, mine, newer).registers).toEqual([
      register('A', 100), // changed by them alone
      register('B', 40), // changed by both: the edits stand
      register('E', 16), // C was taken out by the edits
      register('D', 12), // added by the edits
    ]);
  });

  it('lets a register go that the newer map took out and the edits left alone', () => {
    expect(rebaseMap(base, base, map(register('A', 0))).registers).toEqual([register('A', 0)]);
  });
});
