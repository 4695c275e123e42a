import { setTimeout as sleep } from 'node:timers/promises';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { startTestServer, type TestServer } from '../support/test-server';
import { createRevision, createTarget } from '../support/receivers';

let server: TestServer;
let frozen: number;
let draft: number;
let revisionId: number;

beforeAll(async () => {
  server = await startTestServer();
  await createTarget(server);
  ({ revisionId } = await createRevision(server));
  frozen = await release('1.0.0');
  draft = await release('1.1.0');
  await server
    .as('release')
    .post(`/releases/${frozen}/freeze`, { version: '1.0.0' })
    .set('If-Match', '"2"')
    .expect(200);
});
afterAll(() => server.stop());

async function release(version: string): Promise<number> {
  const { body } = await server.as('release').post('/releases', { target: 'bench', version }).expect(201);
  const entry = server.as('release').put(`/releases/${body.id}/entries/main`, { revisionId });
  await entry.set('If-Match', '"1"').expect(200);
  return body.id as number;
}

/** What the database says to a statement of the application's own user. */
async function sqlState(sql: string): Promise<string> {
  const filled = sql
    .replace(/:frozen/g, String(frozen))
    .replace(/:draft/g, String(draft))
    .replace(/:revision/g, String(revisionId));
  try {
    await server.db.raw(filled);
    return 'done';
  } catch (error) {
    return (error as { sqlState: string }).sqlState;
  }
}

const snapshot = async (): Promise<string> =>
  JSON.stringify([
    await server.db('releases').where({ id: frozen }),
    await server.db('release_entries').where({ release_id: frozen }),
    await server.db('release_files').where({ release_id: frozen }),
    await server.db('revisions'),
    await server.db('targets'),
  ]);

describe('the application’s own database user', () => {
  it.each([
    `UPDATE releases SET version = '2.0.0' WHERE id = :frozen`,
    `UPDATE releases SET state = 'draft', frozen_at = NULL, frozen_by = NULL, digest = NULL WHERE id = :frozen`,
    `UPDATE releases SET digest = REPEAT('0', 64) WHERE id = :frozen`,
    `UPDATE releases SET row_version = row_version + 1 WHERE id = :frozen`,
    `UPDATE releases SET id = 4711 WHERE id = :frozen`,
    `DELETE FROM releases WHERE id = :frozen`,
    `REPLACE INTO releases (id, target_id, version, created_by, created_at) SELECT id, target_id, version, created_by, created_at FROM releases WHERE id = :frozen`,
    `INSERT INTO releases (target_id, version, state, created_by, created_at, frozen_by, frozen_at, digest)
       SELECT target_id, '3.0.0', 'frozen', created_by, created_at, created_by, created_at, REPEAT('0', 64) FROM releases WHERE id = :draft`,
    `INSERT INTO release_entries VALUES (:frozen, 'late', :revision)`,
    `INSERT INTO release_entries VALUES (:frozen, 'main', :revision) ON DUPLICATE KEY UPDATE slot = 'other'`,
    `REPLACE INTO release_entries VALUES (:frozen, 'main', :revision)`,
    `UPDATE release_entries SET slot = 'other' WHERE release_id = :frozen`,
    `UPDATE release_entries SET release_id = :frozen, slot = 'moved' WHERE release_id = :draft`,
    `UPDATE release_entries SET release_id = :draft, slot = 'moved' WHERE release_id = :frozen`,
    `DELETE FROM release_entries WHERE release_id = :frozen`,
    `DELETE release_entries FROM release_entries JOIN releases ON releases.id = release_id WHERE releases.state = 'frozen'`,
    `INSERT INTO release_files VALUES (:frozen, 'extra.h', '', 0, REPEAT('0', 64))`,
    `UPDATE release_files SET content = 'x' WHERE release_id = :frozen`,
    `UPDATE release_files SET release_id = :draft WHERE release_id = :frozen`,
    `DELETE FROM release_files WHERE release_id = :frozen`,
    `UPDATE targets SET slug = 'other' WHERE slug = 'bench'`,
    `DELETE FROM targets WHERE slug = 'bench'`,
    `UPDATE revisions SET note = 'x' WHERE id = :revision`,
    `UPDATE revisions SET design = '{}' WHERE id = :revision`,
    `DELETE FROM revisions WHERE id = :revision`,
    `SET foreign_key_checks = 0; `.concat('DELETE FROM revisions'),
  ])('is refused: %s', async (sql) => {
    const before = await snapshot();
    for (const statement of sql.split('; ')) {
      const state = await sqlState(statement);
      if (statement.startsWith('SET')) expect(state).toBe('done');
      else expect(state).toBe('45000');
    }
    expect(await snapshot()).toBe(before);
  });

  it.each([
    'DROP TRIGGER releases_update',
    'DROP TABLE release_files',
    'TRUNCATE TABLE release_files',
    'ALTER TABLE releases DROP COLUMN digest',
    `CREATE OR REPLACE TRIGGER releases_update BEFORE UPDATE ON releases FOR EACH ROW SET @x = 1`,
    'RENAME TABLE releases TO old_releases',
    'CREATE TABLE own (id INT)',
    'GRANT ALL ON *.* TO CURRENT_USER()',
    'SET GLOBAL general_log = 1',
  ])('may not: %s', async (sql) => {
    // Access denied: 42000 for a table or a privilege, 28000 for a grant.
    expect(await sqlState(sql)).toMatch(/^(42000|28000)$/);
  });

  it('may change a draft and what is not the name of a frozen release', async () => {
    expect(await sqlState(`UPDATE releases SET row_version = row_version + 1 WHERE id = :draft`)).toBe('done');
    expect(await sqlState(`UPDATE targets SET name = 'New name' WHERE slug = 'bench'`)).toBe('done');
    expect(await sqlState(`DELETE FROM release_entries WHERE release_id = :draft`)).toBe('done');
  });
});

describe('a change of the config set while a freeze is under way', () => {
  it.each([
    ['1.2.0', "INSERT INTO release_entries VALUES (:id, 'late', :revision)"],
    ['1.2.1', "UPDATE release_entries SET slot = 'late' WHERE release_id = :id"],
    ['1.2.2', 'DELETE FROM release_entries WHERE release_id = :id'],
  ])('waits for it and is refused: %s %s', async (version, sql) => {
    const id = await release(version);
    let changed: Promise<string>;
    await server.db.transaction(async (trx) => {
      await trx('releases').where({ id }).forUpdate().first();
      changed = sqlState(sql.replace(':id', String(id)));
      const row = {
        state: 'frozen',
        frozen_by: server.people.release.id,
        frozen_at: new Date(),
        digest: '0'.repeat(64),
      };
      await sleep(200); // the other statement now waits; without the lock it would be done
      await trx('releases').where({ id }).update(row);
    });
    expect(await changed!).toBe('45000');
    expect(await server.db('release_entries').where({ release_id: id }).pluck('slot')).toEqual(['main']);
  });
});

describe('the API', () => {
  it('answers 409 with the database’s sentence when a target’s slug is fixed by a frozen release', async () => {
    const { body } = await server.as('engineer').get('/targets/bench');
    const { slug: _slug, planCount: _p, newestRelease: _n, mapNumber: _m, version, ...rest } = body;
    const put = server
      .as('engineer')
      .put('/targets/bench', { ...rest, slug: 'renamed' })
      .set('If-Match', `"${version}"`);
    const refused = await put.expect(409);
    expect(refused.body.title).toMatch(/^A frozen release is found by the slug/);
  });
});
