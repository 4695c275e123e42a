import { randomInt } from 'node:crypto';
import { createServer } from 'node:net';
import { Refusal } from './refusal.mjs';

/** Linux gives outgoing connections ports from 32768 on: a port picked below is not taken from under us. */
const firstPort = 20_000;
const lastPort = 32_767;

/** @returns {Promise<string | undefined>} the system's error code when the port cannot be listened on */
function listenError(/** @type {number} */ port, host = '127.0.0.1') {
  return new Promise((resolve) => {
    const probe = createServer();
    probe.once('error', (/** @type {NodeJS.ErrnoException} */ error) => resolve(error.code ?? error.message));
    probe.listen(port, host, () => probe.close(() => resolve(undefined)));
  });
}

/** @returns {Promise<number>} a port of 127.0.0.1 that nobody listens on at this moment */
export async function freePort() {
  for (let attempt = 0; attempt < 100; attempt += 1) {
    const port = randomInt(firstPort, lastPort + 1);
    if (!(await listenError(port))) return port;
  }
  throw new Refusal(`No free port was found on 127.0.0.1 between ${firstPort} and ${lastPort}.`);
}

/**
 * Reads a port from the environment and makes sure that it can be listened on.
 *
 * @param {string} name the variable, for the sentence
 * @param {number} fallback used when the variable is absent or empty
 * @param {string} [host]
 * @returns {Promise<number>}
 * @throws {Refusal}
 */
export async function portFromEnvironment(name, fallback, host) {
  const text = process.env[name] || String(fallback);
  const port = Number(text);
  if (!Number.isInteger(port) || port < 1 || port > 65_535)
    throw new Refusal(`${name} must be a whole number from 1 to 65535, not “${text}”.`);
  const error = await listenError(port, host);
  if (error === 'EADDRINUSE') throw new Refusal(`Port ${port} is taken by another program. Set ${name} to a free one.`);
  if (error) throw new Refusal(`Port ${port} cannot be opened (${error}). Set ${name} to another one.`);
  return port;
}
