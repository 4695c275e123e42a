import { mkdtempSync, readdirSync, rmSync, statfsSync, writeFileSync, readFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { isAlive } from './folder-lock.mjs';

const prefix = 'keepstep-database-';
const roomWanted = 1 << 30;

/** Memory when there is enough of it, else the disk. */
function base() {
  try {
    const { bavail, bsize } = statfsSync('/dev/shm');
    if (bavail * bsize > roomWanted) return '/dev/shm';
  } catch {
    // No such file system here.
  }
  return tmpdir();
}

const numberIn = (path) => {
  try {
    return Number(readFileSync(path, 'utf8'));
  } catch {
    return 0;
  }
};

/** Removes what a run that was killed left in memory. */
function sweep(folder) {
  for (const name of readdirSync(folder).filter((entry) => entry.startsWith(prefix))) {
    const left = join(folder, name);
    const users = [numberIn(join(left, 'started-by')), numberIn(join(left, 'mariadbd.pid'))];
    if (users[0] > 0 && !users.some(isAlive)) rmSync(left, { recursive: true, force: true });
  }
}

/** @returns {string} a new empty folder for data that nobody will miss */
export function throwAwayFolder() {
  const parent = base();
  sweep(parent);
  const folder = mkdtempSync(join(parent, prefix));
  writeFileSync(join(folder, 'started-by'), String(process.pid));
  return folder;
}
