import { spawnSync } from 'node:child_process';
import { randomBytes } from 'node:crypto';
import { existsSync, readFileSync, renameSync, rmSync, writeFileSync } from 'node:fs';
import { userInfo } from 'node:os';
import { join } from 'node:path';
import { databaseName, userNames } from './mariadb-names.mjs';
import { sentenceFromLog } from './mariadb-log.mjs';
import { Refusal, usingPath } from './refusal.mjs';

/** `--no-defaults` comes first: neither /etc/mysql nor ~/.my.cnf has a say. */
export const commonFlags = [
  '--no-defaults',
  ...(userInfo().uid === 0 ? ['--user=root'] : []),
  '--skip-name-resolve',
  '--default-time-zone=+00:00',
  '--character-set-server=utf8mb4',
  '--collation-server=utf8mb4_unicode_ci',
  '--innodb-log-file-size=32M',
  '--aria-log-file-size=8M',
];

/** Nothing written under these survives a power cut. */
export const throwAwayFlags = [
  '--sync-frm=0',
  '--aria-sync-log-dir=never',
  '--innodb-flush-method=nosync',
  '--innodb-flush-log-at-trx-commit=0',
  '--innodb-doublewrite=0',
];

/** A committed transaction is on the disk, and a torn page can be repaired. */
export const durableFlags = ['--innodb-flush-log-at-trx-commit=1', '--innodb-doublewrite=1'];

/**
 * Makes the system tables when they are absent. They are made beside their place and moved there whole, so that
 * an attempt that was cut short leaves nothing that looks finished.
 *
 * @param {string} folder
 * @throws {Refusal}
 */
export function installData(folder) {
  const data = join(folder, 'data');
  if (existsSync(data)) return;
  const unfinished = join(folder, 'data.unfinished');
  rmSync(unfinished, { recursive: true, force: true });
  const flags = [...commonFlags, ...throwAwayFlags, `--datadir=${unfinished}`, '--skip-test-db'];
  const { status, error, stdout, stderr } = spawnSync('mariadb-install-db', flags, { encoding: 'utf8' });
  if (error) throw new Refusal(`mariadb-install-db cannot be run (${error.message}).`, { cause: error });
  if (status !== 0) throw new Refusal(`MariaDB could not prepare ${data}: ${sentenceFromLog(stderr + stdout)}`);
  spawnSync('sync', ['--file-system', folder]);
  usingPath(data, () => renameSync(unfinished, data));
}

/**
 * The passwords of both users, made once per folder and readable by the owner of the files only.
 *
 * @param {string} folder
 * @returns {{ owner: string, app: string }}
 */
export function passwordsOf(folder) {
  const path = join(folder, 'passwords.json');
  if (existsSync(path)) return JSON.parse(readFileSync(path, 'utf8'));
  const random = () => randomBytes(24).toString('base64url');
  const passwords = { owner: random(), app: random() };
  usingPath(path, () => {
    writeFileSync(`${path}.unfinished`, JSON.stringify(passwords), { mode: 0o600, flush: true });
    renameSync(`${path}.unfinished`, path);
  });
  return passwords;
}

const ownerRights = 'ALL PRIVILEGES';
// No DDL: the application must not be able to drop a trigger that guards its records.
const appRights = 'SELECT, INSERT, UPDATE, DELETE';

/**
 * What the server runs before it lets anyone in. Rights are taken away first, so that a user never keeps one
 * that an older version gave.
 *
 * @param {string} folder
 * @param {{ patterns: string[] }} options databases that both users may use, in GRANT's pattern syntax
 * @returns {string} path of the file
 */
export function writeInitFile(folder, { patterns }) {
  const passwords = passwordsOf(folder);
  const user = (name, password, rights) => [
    `CREATE USER IF NOT EXISTS '${name}'@'127.0.0.1';`,
    `ALTER USER '${name}'@'127.0.0.1' IDENTIFIED BY '${password}';`,
    `REVOKE ALL PRIVILEGES, GRANT OPTION FROM '${name}'@'127.0.0.1';`,
    ...patterns.map((pattern) => `GRANT ${rights} ON \`${pattern}\`.* TO '${name}'@'127.0.0.1';`),
  ];
  const path = join(folder, 'init.sql');
  const statements = [
    `CREATE DATABASE IF NOT EXISTS \`${databaseName}\`;`,
    ...user(userNames.owner, passwords.owner, ownerRights),
    ...user(userNames.app, passwords.app, appRights),
  ];
  usingPath(path, () => writeFileSync(path, `${statements.join('\n')}\n`, { mode: 0o600 }));
  return path;
}
