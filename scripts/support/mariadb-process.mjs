import { spawn } from 'node:child_process';
import { existsSync, readFileSync, renameSync } from 'node:fs';
import { connect } from 'node:net';
import { join } from 'node:path';
import { setTimeout as sleep } from 'node:timers/promises';
import { commonFlags } from './mariadb-folder.mjs';
import { saysDiskFull } from './mariadb-log.mjs';

/** Long enough for the recovery of a database of this size on a slow disk, in ms. */
const longestStart = 120_000;
/** Pages are written out first; after this long the process is killed and the next start recovers, in ms. */
const longestStop = 60_000;

const read = (path) => (existsSync(path) ? readFileSync(path, 'utf8') : '');

/** @returns {Promise<boolean>} whether a database greets on the port */
const greets = (port) =>
  new Promise((resolve) => {
    const socket = connect(port, '127.0.0.1');
    const answer = (greeted) => {
      socket.destroy();
      resolve(greeted);
    };
    socket.once('data', () => answer(true)).once('error', () => answer(false));
    socket.setTimeout(500, () => answer(false));
  });

/**
 * Starts mariadbd on 127.0.0.1. It ends with this process even when this one is killed (`setpriv --pdeathsig`);
 * it has a process group of its own, so that Ctrl-C in a terminal reaches it through us only, after the server.
 *
 * @param {{ folder: string, port: number, flags: string[], lockFile?: number }} options `lockFile` stays open in
 *   mariadbd: the folder is locked for as long as either process lives
 */
export function spawnMariadb({ folder, port, flags, lockFile }) {
  const logPath = join(folder, 'error.log');
  const pidPath = join(folder, 'mariadbd.pid');
  if (existsSync(logPath)) renameSync(logPath, `${logPath}.previous`);
  const command = [
    'mariadbd',
    ...commonFlags,
    ...flags,
    `--datadir=${join(folder, 'data')}`,
    '--socket=mariadbd.sock', // in the data folder: an absolute path may be longer than the 107 bytes allowed
    `--pid-file=${pidPath}`,
    `--log-error=${logPath}`,
    '--bind-address=127.0.0.1',
    `--port=${port}`,
  ];
  const stdio = ['ignore', 'ignore', 'ignore', ...(lockFile === undefined ? [] : [lockFile])];
  // Debian keeps mariadbd in /usr/sbin, which is not on everyone's path.
  const env = { ...process.env, PATH: `${process.env.PATH}:/usr/sbin` };
  const child = spawn('setpriv', ['--pdeathsig', 'TERM', ...command], { stdio, env, detached: true });
  return watch(child, { port, pidPath, logPath });
}

function watch(child, { port, pidPath, logPath }) {
  let running = true;
  const ended = new Promise((resolve) => {
    child.once('exit', resolve).once('error', resolve);
  }).then(() => {
    running = false;
  });
  // The port alone could be another program's: the process id is written after the port was bound.
  const ready = async () => Number(read(pidPath)) === child.pid && (await greets(port));
  return {
    pid: child.pid,
    /** Settles when the process has ended, for whatever reason. */
    ended,
    log: () => read(logPath),
    /** @returns {Promise<boolean>} true once it answers; false when it ended, is stuck on a full disk or took too long */
    async waitUntilReady() {
      const deadline = Date.now() + longestStart;
      while (running && Date.now() < deadline && !saysDiskFull(read(logPath))) {
        if (await ready()) return running;
        await sleep(20);
      }
      return false;
    },
    /** Ends it in order; kills it when it has not ended after `patience`, in ms. */
    async stop(patience = longestStop) {
      child.kill('SIGTERM');
      const kill = setTimeout(() => child.kill('SIGKILL'), patience);
      await ended;
      clearTimeout(kill);
    },
  };
}
