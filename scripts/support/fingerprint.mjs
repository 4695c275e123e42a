import { createHash } from 'node:crypto';
import { readFileSync, readdirSync, statSync } from 'node:fs';
import { join } from 'node:path';

function* filesUnder(root, path) {
  const stats = statSync(join(root, path), { throwIfNoEntry: false });
  if (!stats) return;
  if (!stats.isDirectory()) return yield path;
  for (const name of readdirSync(join(root, path)).sort()) yield* filesUnder(root, `${path}/${name}`);
}

/**
 * One hash over the names and contents of files, folders with all that is in them. Absent ones count as absent.
 *
 * @param {string} root
 * @param {readonly string[]} paths relative to the root
 * @returns {string} SHA-256, hexadecimal
 */
export function fingerprint(root, paths) {
  const hash = createHash('sha256');
  for (const path of paths) {
    for (const file of filesUnder(root, path)) {
      const content = readFileSync(join(root, file));
      hash.update(`${file}\0${content.length}\0`).update(content);
    }
  }
  return hash.digest('hex');
}
