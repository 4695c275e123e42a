import { accessSync, constants } from 'node:fs';
import { join } from 'node:path';
import { Refusal } from './refusal.mjs';
import { run } from './run.mjs';
import { nothingToDo, step } from './step.mjs';

/**
 * @typedef {object} Need
 * @property {string} label
 * @property {string} program what has to be there
 * @property {string} debianPackage where it comes from
 */

// Debian keeps mariadbd in /usr/sbin, which is not on everyone's path.
const folders = [...(process.env.PATH ?? '').split(':'), '/usr/sbin', '/usr/bin'];

const canRun = (path) => {
  try {
    accessSync(path, constants.X_OK);
    return true;
  } catch {
    return false;
  }
};

/** @returns {boolean} */
const isPresent = (/** @type {string} */ program) => folders.some((folder) => canRun(join(folder, program)));

const install = ['install', '-y', '-qq', '--no-install-recommends', '-o', 'DPkg::Lock::Timeout=300'];

/** What a person may type, as one command. */
const byHand = (packages) =>
  `sudo sh -c 'apt-get update && apt-get install -y --no-install-recommends ${packages.join(' ')}'`;

/** @returns {Promise<string[] | undefined>} what goes before a command to run it as root; undefined: it may not be */
async function asRoot() {
  if (process.getuid?.() === 0) return [];
  const { code } = await run(['sudo', '-n', 'true']);
  return code === 0 ? ['sudo', '-n'] : undefined;
}

async function installPackages(prefix, packages) {
  const aptGet = [...prefix, 'env', 'DEBIAN_FRONTEND=noninteractive', 'apt-get'];
  // Lists that one broken source could not refresh may still be good enough.
  const update = await run([...aptGet, 'update', '-qq', '-o', 'DPkg::Lock::Timeout=300']);
  const { code, output } = await run([...aptGet, ...install, ...packages]);
  if (code === 0) return;
  throw new Refusal(`${update.output}${output}\nThe Debian packages could not be installed: ${packages.join(' ')}.`);
}

/**
 * Installs the Debian packages of programs that are missing, when this user may.
 *
 * @param {readonly Need[]} needs
 * @throws {Refusal} with the one command to run when this user may not, or with what apt-get said
 */
export async function installMissing(needs) {
  const missing = needs.filter(({ program }) => !isPresent(program));
  const present = needs.filter((need) => !missing.includes(need)).map(({ label }) => label);
  if (present.length > 0) nothingToDo([...new Set(present)].join(', '), 'present');
  if (missing.length === 0) return;
  const packages = missing.map(({ debianPackage }) => debianPackage);
  if (!isPresent('apt-get'))
    throw new Refusal(`Please install ${missing.map(({ program }) => program).join(', ')} and start again.`);
  const prefix = await asRoot();
  if (!prefix)
    throw new Refusal(`Debian packages are missing. Please run this and start again:\n\n  ${byHand(packages)}\n`);
  await step(`Debian packages ${packages.join(' ')}`, () => installPackages(prefix, packages));
}
