import { spawn } from 'node:child_process';
import { Refusal } from './refusal.mjs';
import { root } from './root.mjs';

/** @typedef {{ code: number, output: string }} Outcome code 127: the program could not be started */

/**
 * Runs a program in the checkout to its end. It ends with this process, even when this one is killed.
 *
 * @param {readonly string[]} command program and arguments
 * @param {{ env?: Record<string, string>, show?: boolean }} [options] `show`: its output goes to the terminal instead
 *   of into the answer
 * @returns {Promise<Outcome>}
 */
export function run(command, { env = {}, show = false } = {}) {
  return new Promise((resolve) => {
    const child = spawn('setpriv', ['--pdeathsig', 'TERM', ...command], {
      cwd: root,
      env: { ...process.env, ...env },
      stdio: ['ignore', show ? 'inherit' : 'pipe', show ? 'inherit' : 'pipe'],
    });
    let output = '';
    for (const stream of [child.stdout, child.stderr]) stream?.on('data', (text) => (output += text));
    child.once('error', (error) => resolve({ code: 127, output: error.message }));
    child.once('close', (code) => resolve({ code: code ?? 1, output }));
  });
}

/**
 * Runs a program that has to succeed.
 *
 * @param {readonly string[]} command
 * @param {{ env?: Record<string, string> }} [options]
 * @throws {Refusal} with what the program said
 */
export async function mustRun(command, options) {
  const { code, output } = await run(command, options);
  if (code === 0) return;
  const full = /ENOSPC|No space left/.test(output) ? 'The disk is full. ' : '';
  throw new Refusal(`${output.trimEnd()}\n\n${full}“${command.join(' ')}” failed (${code}).`);
}
