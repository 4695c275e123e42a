import { readFileSync, readdirSync } from 'node:fs';

const environmentOf = (pid) => {
  try {
    return readFileSync(`/proc/${pid}/environ`, 'latin1').split('\0');
  } catch {
    return []; // It ended meanwhile, or is somebody else's.
  }
};

const commandOf = (pid) => {
  try {
    return readFileSync(`/proc/${pid}/cmdline`, 'utf8').split('\0').join(' ').trim();
  } catch {
    return '';
  }
};

/**
 * The processes, besides this one, that carry an environment variable.
 *
 * @param {string} name
 * @param {string} value
 * @returns {{ pid: number, command: string }[]}
 */
export function processesWith(name, value) {
  const pids = readdirSync('/proc')
    .map(Number)
    .filter((pid) => pid > 0 && pid !== process.pid);
  return pids
    .filter((pid) => environmentOf(pid).includes(`${name}=${value}`))
    .map((pid) => ({ pid, command: commandOf(pid) }))
    .filter(({ command }) => command !== ''); // A process that ended and was not collected has none.
}
