import { createHash } from 'node:crypto';
import { existsSync, readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { mustRun } from './run.mjs';
import { nothingToDo, step } from './step.mjs';

/** @returns {string} changes when the installed packages have to */
function wantedPackages(root) {
  const lock = readFileSync(join(root, 'package-lock.json'));
  return createHash('sha256').update(`${process.version} ${process.arch}\n`).update(lock).digest('hex');
}

/**
 * Installs the npm packages exactly as locked, unless they are already. The mark lies among the packages: whoever
 * removes them removes it too.
 *
 * @param {string} root
 */
export async function installNpmPackages(root) {
  const mark = join(root, 'node_modules', '.installed-from');
  const wanted = wantedPackages(root);
  if (existsSync(mark) && readFileSync(mark, 'utf8') === wanted) return nothingToDo('npm packages', 'present');
  await step('npm packages', () => mustRun(['npm', 'ci', '--include=dev', '--no-audit', '--no-fund']));
  writeFileSync(mark, wanted);
}
