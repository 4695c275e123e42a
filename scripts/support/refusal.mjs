/** A stop the reader can act on: shown as one sentence, without a stack. */
export class Refusal extends Error {}

/**
 * Runs a command's main function; a Refusal ends the process with its sentence, anything else with its stack.
 *
 * @param {() => Promise<number | void>} main answers the exit code, 0 when nothing
 */
export async function runMain(main) {
  try {
    process.exitCode = (await main()) ?? 0;
  } catch (error) {
    console.error(error instanceof Refusal ? error.message : error);
    process.exitCode = 1;
  }
}

const reasons = {
  ENOSPC: 'the disk is full',
  EDQUOT: 'the disk quota is used up',
  EACCES: 'it may not be written',
  EPERM: 'it may not be written',
  EROFS: 'it lies on a read-only file system',
  ENOTDIR: 'a file stands where a folder should be',
  EEXIST: 'a file stands where a folder should be',
};

/**
 * Does file work and turns a system error into one sentence that names the path.
 *
 * @template T
 * @param {string} path
 * @param {() => T} work
 * @returns {T}
 * @throws {Refusal}
 */
export function usingPath(path, work) {
  try {
    return work();
  } catch (error) {
    if (!error.code) throw error;
    throw new Refusal(`${path} cannot be used: ${reasons[error.code] ?? error.message}.`, { cause: error });
  }
}
