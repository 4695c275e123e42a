import { spawnSync } from 'node:child_process';
import { closeSync, ftruncateSync, openSync, readFileSync, writeSync } from 'node:fs';
import { setTimeout as sleep } from 'node:timers/promises';
import { Refusal, usingPath } from './refusal.mjs';

/** A database that was told to end writes its pages out first; this is the longest we wait for one, in ms. */
const longestShutdown = 60_000;

/** @returns {boolean} whether the process runs; one that ended and was not yet collected does not */
export function isAlive(/** @type {number} */ pid) {
  try {
    const status = readFileSync(`/proc/${pid}/stat`, 'utf8');
    return status.slice(status.lastIndexOf(')') + 2, status.lastIndexOf(')') + 3) !== 'Z';
  } catch {
    return false;
  }
}

// The kernel ties the lock to the opened file, not to the program `flock`: it holds for as long as this process,
// or one that was given the file, lives. Nothing is left to clean up after a SIGKILL.
function tryLock(file) {
  const { status, error } = spawnSync('flock', ['--nonblock', '3'], { stdio: ['ignore', 'ignore', 'ignore', file] });
  if (error) throw new Refusal('The program flock (Debian package util-linux) is missing.', { cause: error });
  return status === 0;
}

/**
 * Takes a folder's lock for this process. When the process that had it is gone and only its database is still
 * shutting down, waits for that.
 *
 * @param {string} path the lock file; holds the process id of whoever has it
 * @returns {Promise<{ file: number, release(): void }>} `file` is to be handed to the database as an open file
 * @throws {Refusal} naming the live process that has the lock
 */
export async function lockFolder(path) {
  const file = usingPath(path, () => openSync(path, 'a', 0o600));
  const deadline = Date.now() + longestShutdown;
  while (!tryLock(file)) {
    const holder = Number(readFileSync(path, 'utf8'));
    if (isAlive(holder) || Date.now() > deadline) {
      closeSync(file);
      throw new Refusal(`Keepstep already runs in this checkout: process ${holder} has its database.`);
    }
    await sleep(100);
  }
  ftruncateSync(file);
  writeSync(file, String(process.pid));
  return { file, release: () => closeSync(file) };
}
