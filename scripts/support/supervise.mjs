import { spawn } from 'node:child_process';
import { once } from 'node:events';
import { root } from './root.mjs';

/** A program that was asked to end is killed after this, in ms. */
const longestStop = 15_000;

/**
 * @typedef {object} Supervised
 * @property {Promise<string>} ended how it ended: `exit code 1`, `signal SIGKILL`
 * @property {Promise<{ address: string }>} ready its first message to us
 * @property {() => Promise<void>} stop ends it and all that it started
 */

// Its own process group: Ctrl-C in a terminal reaches it through us, in our order.
function signalGroup(child, signal) {
  try {
    process.kill(-child.pid, signal);
  } catch {
    // It ended meanwhile.
  }
}

/**
 * Starts a program that runs until it is stopped, at the latest when this process ends.
 *
 * @param {readonly string[]} command
 * @param {Record<string, string>} env added to our own
 * @returns {Supervised}
 */
export function supervise(command, env) {
  const child = spawn('setpriv', ['--pdeathsig', 'TERM', ...command], {
    cwd: root,
    env: { ...process.env, ...env },
    stdio: ['ignore', 'inherit', 'inherit', 'ipc'],
    detached: true,
  });
  const ended = new Promise((resolve) => {
    child.once('exit', (code, signal) => resolve(signal ? `signal ${signal}` : `exit code ${code}`));
    child.once('error', (error) => resolve(error.message));
  });
  return {
    ended,
    ready: once(child, 'message').then(([message]) => message),
    async stop() {
      signalGroup(child, 'SIGTERM');
      const kill = setTimeout(() => signalGroup(child, 'SIGKILL'), longestStop);
      await ended;
      clearTimeout(kill);
      signalGroup(child, 'SIGKILL');
    },
  };
}

/** Settles when somebody asks this process to end; being asked again changes nothing. */
export const askedToEnd = () =>
  new Promise((resolve) => {
    for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP']) process.on(signal, () => resolve(signal));
  });

/**
 * Waits until somebody asks for the end or one of the parts ends by itself.
 *
 * @param {Record<string, Promise<unknown>>} parts what each is called, and when it ends
 * @param {Promise<unknown>} asked
 * @returns {Promise<string | undefined>} a sentence about the part that ended by itself; undefined: all is in order
 */
export function firstToEnd(parts, asked) {
  const ends = Object.entries(parts).map(async ([name, ended]) => {
    const how = await ended;
    return `${name} ended by itself${how ? ` (${how})` : ''}.`;
  });
  return Promise.race([asked.then(() => undefined), ...ends]);
}
