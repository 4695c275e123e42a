import { describe, expect, it } from 'vitest';
import { conflictsOf, merged } from '../../../shared/plan/merge';

const base = {
  name: 'Uplink',
  signal: { rollOff: 0.35, esN0Db: 10 },
  carrier: { delay: 2, stages: [{ name: 'track' }] },
};
const mine = { ...base, signal: { rollOff: 0.2, esN0Db: 9 } };
const theirs = { ...base, signal: { rollOff: 0.25, esN0Db: 10 }, carrier: { ...base.carrier, delay: 3 } };

describe('conflictsOf', () => {
  it('lists every field that differs, with who changed it', () => {
    expect(conflictsOf({ base, mine, theirs }).map(({ pointer, changedBy }) => [pointer, changedBy])).toEqual([
      ['/signal/rollOff', 'both'],
      ['/signal/esN0Db', 'me'],
      ['/carrier/delay', 'them'],
    ]);
  });

  it('asks about every field when the common start is not known', () => {
    const authors = conflictsOf({ base: undefined, mine, theirs }).map(({ changedBy }) => changedBy);
    expect(authors).toEqual(['both', 'both', 'both']);
  });
});

describe('merged', () => {
  it('is theirs but for the fields that are kept', () => {
    const plan = merged({ base, mine, theirs }, new Set(['/signal/esN0Db']));
    expect(plan).toEqual({ ...theirs, signal: { rollOff: 0.25, esN0Db: 9 } });
  });

  it('is mine when everything is kept', () => {
    const all = new Set(conflictsOf({ base, mine, theirs }).map(({ pointer }) => pointer));
    expect(merged({ base, mine, theirs }, all)).toEqual(mine);
  });
});
