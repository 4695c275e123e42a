import { mkdirSync, rmSync, statfsSync } from 'node:fs';
import { join, resolve } from 'node:path';
import { lockFolder } from './support/folder-lock.mjs';
import { durableFlags, installData, passwordsOf, throwAwayFlags, writeInitFile } from './support/mariadb-folder.mjs';
import { saysPortTaken, sentenceFromLog } from './support/mariadb-log.mjs';
import { databaseName, testDatabasePattern, userNames } from './support/mariadb-names.mjs';
import { spawnMariadb } from './support/mariadb-process.mjs';
import { freePort } from './support/ports.mjs';
import { Refusal, usingPath } from './support/refusal.mjs';
import { throwAwayFolder } from './support/throw-away-folder.mjs';

/** System tables and redo log need this much before the first row is written, in bytes. */
const roomWanted = 200 * 2 ** 20;

const kept = { flags: [...durableFlags, '--innodb-buffer-pool-size=128M'], patterns: [databaseName] };
const throwAway = {
  flags: [...throwAwayFlags, '--innodb-buffer-pool-size=128M', '--max-connections=500'],
  patterns: [databaseName, testDatabasePattern],
};

function checkRoom(folder) {
  const { bavail, bsize } = statfsSync(folder);
  const free = Math.floor((bavail * bsize) / 2 ** 20);
  if (bavail * bsize >= roomWanted) return;
  throw new Refusal(
    `The disk is full: ${folder} has ${free} MB left and the database needs ${roomWanted / 2 ** 20} MB.`,
  );
}

async function launch(folder, { flags, patterns }, lockFile) {
  checkRoom(folder);
  installData(folder);
  const initFile = writeInitFile(folder, { patterns });
  for (let attempt = 1; ; attempt += 1) {
    const port = await freePort();
    const mariadb = spawnMariadb({ folder, port, flags: [...flags, `--init-file=${initFile}`], lockFile });
    const ready = await mariadb.waitUntilReady();
    if (ready) return { mariadb, port };
    await mariadb.stop(5_000);
    const log = mariadb.log();
    if (attempt === 5 || !saysPortTaken(log)) throw new Refusal(`MariaDB did not start: ${sentenceFromLog(log)}`);
  }
}

/** @typedef {{ user: string, password: string }} Account */
/**
 * @typedef {object} Database
 * @property {string} host 127.0.0.1
 * @property {number} port below 32768
 * @property {Account} owner may change tables, triggers and everything else in the database
 * @property {Account} app may SELECT, INSERT, UPDATE, DELETE
 * @property {string} database name of the database both may use
 * @property {number} pid of mariadbd
 * @property {Promise<string>} ended settles when mariadbd has ended, for whatever reason; says where its log is
 * @property {() => Promise<void>} stop ends mariadbd; throw-away data goes with it
 */

async function start(folder, kind, { lockFile, cleanUp }) {
  try {
    const { mariadb, port } = await launch(folder, kind, lockFile);
    const passwords = passwordsOf(folder);
    rmSync(join(folder, 'init.sql'), { force: true });
    return {
      host: '127.0.0.1',
      port,
      owner: { user: userNames.owner, password: passwords.owner },
      app: { user: userNames.app, password: passwords.app },
      database: databaseName,
      pid: mariadb.pid,
      ended: mariadb.ended.then(() => `its log: ${join(folder, 'error.log')}`),
      stop: () => mariadb.stop().finally(cleanUp),
    };
  } catch (error) {
    cleanUp();
    throw error;
  }
}

/**
 * Starts a private MariaDB on 127.0.0.1, with a database and two users in it. It ends when this process ends.
 *
 * @param {{ dir?: string }} [options] `dir`: where the data is kept from one start to the next, for one process at a
 *   time; without it the data is thrown away on stop, nothing is flushed to disk, and both users may also use every
 *   database named `keepstep_test_…`
 * @returns {Promise<Database>}
 * @throws {Refusal} when another process has the folder, the disk is full, or MariaDB does not start
 */
export async function startDatabase({ dir } = {}) {
  if (dir === undefined) {
    const folder = throwAwayFolder();
    return start(folder, throwAway, { cleanUp: () => rmSync(folder, { recursive: true, force: true }) });
  }
  const folder = resolve(dir);
  usingPath(folder, () => mkdirSync(folder, { recursive: true, mode: 0o700 }));
  const lock = await lockFolder(join(folder, 'lock'));
  return start(folder, kept, { lockFile: lock.file, cleanUp: lock.release });
}

/**
 * @param {Pick<Database, 'host' | 'port'>} server
 * @param {Account} account
 * @param {string} database
 * @returns {string} the address as Knex and mysql2 read it
 */
export const databaseUrl = ({ host, port }, { user, password }, database) =>
  `mysql://${user}:${password}@${host}:${port}/${database}`;
