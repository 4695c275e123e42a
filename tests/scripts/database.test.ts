import { spawn, type ChildProcess } from 'node:child_process';
import { existsSync, mkdtempSync, readFileSync, rmSync, statSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { createConnection, type RowDataPacket } from 'mysql2/promise';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { databaseUrl, startDatabase, type Database } from '../../scripts/database.mjs';

const script = fileURLToPath(new URL('../../scripts/database.mjs', import.meta.url));

async function query(url: string, sql: string): Promise<RowDataPacket[]> {
  const connection = await createConnection(url);
  try {
    const [rows] = await connection.query<RowDataPacket[]>(sql);
    return rows;
  } finally {
    await connection.end();
  }
}

const asOwner = (database: Database) => databaseUrl(database, database.owner, database.database);
const asApp = (database: Database) => databaseUrl(database, database.app, database.database);

/** A process of its own that starts the database in `dir` and does nothing more. */
async function startElsewhere(dir: string): Promise<{ starter: ChildProcess; database: Database }> {
  const code = `
    import { startDatabase } from ${JSON.stringify(script)};
    process.send(await startDatabase({ dir: ${JSON.stringify(dir)} }));
    setInterval(() => undefined, 1000);`;
  const starter = spawn(process.execPath, ['--input-type=module', '--eval', code], {
    stdio: ['ignore', 'inherit', 'inherit', 'ipc'],
  });
  const database = await new Promise<Database>((resolve, reject) => {
    starter.once('message', (message) => resolve(message as Database));
    starter.once('exit', (code) => reject(new Error(`ended with ${code}`)));
  });
  return { starter, database };
}

describe('startDatabase', { timeout: 60_000 }, () => {
  let dir: string;
  const running: Database[] = [];
  const start = async (options?: { dir: string }) => {
    const database = await startDatabase(options);
    running.push(database);
    return database;
  };
  beforeEach(() => {
    dir = mkdtempSync(join(tmpdir(), 'keepstep-test-'));
  });
  afterEach(async () => {
    await Promise.all(running.splice(0).map((database) => database.stop()));
    rmSync(dir, { recursive: true, force: true });
  });

  it('gives the application rows and nothing else', async () => {
    const database = await start();
    await query(asOwner(database), 'CREATE TABLE t (id INT PRIMARY KEY)');
    await query(asOwner(database), 'CREATE TRIGGER g BEFORE DELETE ON t FOR EACH ROW SET @x = 1');
    await query(asApp(database), 'INSERT INTO t VALUES (1)');
    expect(await query(asApp(database), 'SELECT id FROM t')).toEqual([{ id: 1 }]);
    for (const refused of ['DROP TRIGGER g', 'DROP TABLE t', 'ALTER TABLE t ADD n INT', 'CREATE TABLE u (id INT)'])
      await expect(query(asApp(database), refused)).rejects.toThrow(/denied/);
  });

  it('lets the owner make test databases that the application may use', async () => {
    const database = await start();
    const inTest = (account: { user: string; password: string }) => databaseUrl(database, account, 'keepstep_test_a');
    await query(asOwner(database), 'CREATE DATABASE keepstep_test_a');
    await query(inTest(database.owner), 'CREATE TABLE t (id INT)');
    await query(inTest(database.app), 'INSERT INTO t VALUES (2)');
    await expect(query(asOwner(database), 'CREATE DATABASE keepstepXtestXa')).rejects.toThrow(/denied/);
  });

  it('keeps passwords to itself and listens on loopback only', async () => {
    const database = await start({ dir });
    expect(statSync(join(dir, 'passwords.json')).mode & 0o777).toBe(0o600);
    expect(existsSync(join(dir, 'init.sql'))).toBe(false);
    expect(await query(asOwner(database), 'SELECT @@bind_address AS address')).toEqual([{ address: '127.0.0.1' }]);
  });

  it('flushes every commit of data that is kept', async () => {
    const database = await start({ dir });
    const flags = 'SELECT @@innodb_flush_log_at_trx_commit AS flush, @@innodb_doublewrite AS doublewrite';
    expect(await query(asOwner(database), flags)).toEqual([{ flush: 1, doublewrite: 1 }]);
  });

  it('refuses a second start and names the process that has the folder', async () => {
    await start({ dir });
    await expect(startDatabase({ dir })).rejects.toThrow(
      `Keepstep already runs in this checkout: process ${process.pid} has its database.`,
    );
  });

  it('keeps a committed row over kill -9 of the database', async () => {
    const database = await start({ dir });
    await query(asOwner(database), 'CREATE TABLE t (id INT)');
    await query(asApp(database), 'INSERT INTO t VALUES (3)');
    process.kill(database.pid, 'SIGKILL');
    await database.ended;
    await running.pop()?.stop();
    expect(await query(asApp(await start({ dir })), 'SELECT id FROM t')).toEqual([{ id: 3 }]);
  });

  it('waits for the database of a starter that was killed, and keeps its rows', async () => {
    const { starter, database } = await startElsewhere(dir);
    await query(asOwner(database), 'CREATE TABLE t (id INT)');
    await query(asApp(database), 'INSERT INTO t VALUES (4)');
    starter.kill('SIGKILL');
    const next = await start({ dir });
    expect(existsSync(`/proc/${database.pid}/exe`)).toBe(false);
    expect(await query(asApp(next), 'SELECT id FROM t')).toEqual([{ id: 4 }]);
  });

  it('throws its data away on stop', async () => {
    const database = await startDatabase();
    const dataOf = () => readFileSync(`/proc/${database.pid}/cmdline`, 'utf8').match(/--datadir=([^\0]+)/)?.[1] ?? '';
    const data = dataOf();
    expect(existsSync(data)).toBe(true);
    await database.stop();
    expect(existsSync(data)).toBe(false);
  });

  it('says in one sentence that a folder cannot be used', async () => {
    writeFileSync(join(dir, 'file'), '');
    const path = join(dir, 'file', 'db');
    await expect(startDatabase({ dir: path })).rejects.toThrow(
      `${path} cannot be used: a file stands where a folder should be.`,
    );
  });
});
