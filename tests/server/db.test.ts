import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { Knex } from 'knex';
import { asDatabaseRefusal } from '../../server/database-refusal';
import { inTransaction, openDb } from '../../server/db';
import { createTestDatabase, type TestDatabase } from '../support/create-database';

let database: TestDatabase;
let owner: Knex;
let db: Knex;

beforeAll(async () => {
  database = await createTestDatabase();
  owner = openDb(database.ownerUrl);
  db = openDb(database.appUrl);
  await owner.raw('CREATE TABLE parents (id INT PRIMARY KEY, name VARCHAR(5) UNIQUE, amount INT CHECK (amount >= 0))');
  await owner.raw(
    'CREATE TABLE children (id INT PRIMARY KEY, parent INT NOT NULL, FOREIGN KEY (parent) REFERENCES parents (id))',
  );
  await owner.raw('CREATE TABLE times (at DATETIME(3))');
  await db('parents').insert([
    { id: 1, name: 'a', amount: 0 },
    { id: 2, name: 'b', amount: 0 },
  ]);
  await db('children').insert({ id: 1, parent: 1 });
});
afterAll(async () => {
  await Promise.all([db.destroy(), owner.destroy()]);
  await database.drop();
});

describe('inTransaction', () => {
  it('runs the work of a deadlock’s victim again: both succeed', async () => {
    let attempts = 0;
    let arrived = 0;
    let open = () => {};
    const both = new Promise<void>((resolve) => (open = resolve));
    const raise = (first: number, second: number) =>
      inTransaction(db, async (trx) => {
        attempts += 1;
        await trx('parents').where({ id: first }).increment('amount', 1);
        arrived += 1;
        if (arrived === 2) open();
        await both;
        await trx('parents').where({ id: second }).increment('amount', 1);
      });
    await Promise.all([raise(1, 2), raise(2, 1)]);
    expect(attempts).toBe(3);
    expect(await db('parents').orderBy('id').pluck('amount')).toEqual([2, 2]);
  });

  it('undoes the work that throws, and throws it on', async () => {
    const work = inTransaction(db, async (trx) => {
      await trx('parents').where({ id: 1 }).update({ amount: 99 });
      throw new Error('no');
    });
    await expect(work).rejects.toThrow('no');
    expect(await db('parents').where({ id: 1 }).pluck('amount')).toEqual([2]);
  });
});

describe('a refusal of the database', () => {
  it.each([
    ['a name that is taken', `INSERT INTO parents VALUES (3, 'a', 0)`, 'conflict'],
    ['a parent that is not there', 'INSERT INTO children VALUES (2, 9)', 'conflict'],
    ['a parent that is needed', 'DELETE FROM parents WHERE id = 1', 'conflict'],
    ['a value that breaks a CHECK', 'UPDATE parents SET amount = -1', 'invalid'],
    ['a text that is too long', `UPDATE parents SET name = 'too long' WHERE id = 1`, 'invalid'],
    ['a number that is too large', 'UPDATE parents SET amount = 99999999999', 'invalid'],
    ['a number that is none', `UPDATE parents SET amount = 'many'`, 'invalid'],
  ])('%s is the caller’s to mend', async (_, sql, kind) => {
    const error: unknown = await db.raw(sql).then(
      () => undefined,
      (reason: unknown) => reason,
    );
    expect(asDatabaseRefusal(error)).toMatchObject({ kind, cause: error });
  });

  it('that nobody foresaw stays a defect', async () => {
    const error: unknown = await db.raw('SELECT * FROM nowhere').catch((reason: unknown) => reason);
    expect(asDatabaseRefusal(error)).toBeUndefined();
    expect(asDatabaseRefusal(new Error('other'))).toBeUndefined();
  });
});

describe('a connection', () => {
  it('keeps time in UTC, to the millisecond', async () => {
    const at = new Date('2026-03-29T01:30:00.123Z'); // an hour that Central Europe skips
    await db('times').insert({ at });
    const [[text]] = (await db.raw('SELECT CAST(at AS CHAR) AS text FROM times')) as [[{ text: string }]];
    expect(text.text).toBe('2026-03-29 01:30:00.123');
    expect(await db('times').pluck('at')).toEqual([at]);
  });
});
