import type { Knex } from 'knex';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import * as plans from '../../migrations/20261201_3_create_plans';
import { migrationSource } from '../../migrations/index';
import { openDb } from '../../server/db';
import { migrate } from '../../server/migrate';
import { createTestDatabase, type TestDatabase } from '../support/create-database';

let database: TestDatabase;
let owner: Knex;

beforeAll(async () => {
  database = await createTestDatabase();
  owner = openDb(database.ownerUrl, { connections: 6 });
});
afterAll(async () => {
  await owner.destroy();
  await database.drop();
});

const column = async (sql: string): Promise<unknown[]> =>
  ((await owner.raw(sql)) as [Record<string, unknown>[]])[0].map((row) => Object.values(row)[0]);

describe('migrate', () => {
  it('lets two servers that start at once migrate one after the other', async () => {
    const [one, other] = await Promise.all([migrate(owner), migrate(owner)]);
    expect([one.length, other.length].sort()).toEqual([0, 7]);
  });

  it('names migrations without extension, so that the build finds what the sources left', async () => {
    const stored = await column('SELECT name FROM knex_migrations ORDER BY id');
    expect(stored).toEqual(await migrationSource.getMigrations([]));
    for (const name of stored) expect(name).not.toMatch(/\.[jt]s$/);
  });

  it('frees the lock of a start that was killed', async () => {
    await owner('knex_migrations_lock').update({ is_locked: 1 });
    expect(await migrate(owner)).toEqual([]);
  });

  it('bears to begin a step again that was cut short', async () => {
    await expect(plans.up(owner)).resolves.toBeUndefined();
  });

  it('stores every character: no text column narrower than UTF-8 holds what people write', async () => {
    const names = await column(
      `SELECT CONCAT(table_name, '.', column_name) FROM information_schema.columns
       WHERE table_schema = DATABASE() AND column_name IN ('name', 'note', 'subject', 'description', 'plan', 'typed')
         AND character_set_name <> 'utf8mb4' AND table_name NOT LIKE 'knex%'`,
    );
    expect(names).toEqual(['release_files.name']); // made of slots, which are ASCII
  });

  it('can go all the way back', async () => {
    await owner.migrate.rollback({ migrationSource, disableTransactions: true }, true);
    const tables = await column(`SELECT table_name FROM information_schema.tables WHERE table_schema = DATABASE()`);
    expect(tables.filter((name) => !String(name).startsWith('knex'))).toEqual([]);
  });
});
