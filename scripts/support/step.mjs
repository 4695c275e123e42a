const secondsSince = (begin) => `${((performance.now() - begin) / 1000).toFixed(1)} s`;

/**
 * Says what is being done and, once it is done, the time it took: `npm packages … 41.2 s`.
 *
 * @template T
 * @param {string} label
 * @param {() => T | Promise<T>} work
 * @returns {Promise<T>} what the work answers
 */
export async function step(label, work) {
  process.stdout.write(`${label} … `);
  const begin = performance.now();
  try {
    const answer = await work();
    console.log(secondsSince(begin));
    return answer;
  } catch (error) {
    console.log('failed');
    throw error;
  }
}

/**
 * The line of a step that had nothing to do: `MariaDB … present`.
 *
 * @param {string} label
 * @param {string} state
 */
export function nothingToDo(label, state) {
  console.log(`${label} … ${state}`);
}

/**
 * A step whose own program has the terminal meanwhile: its line comes when it is done, and none when it failed.
 *
 * @template T
 * @param {string} label
 * @param {() => Promise<T | undefined>} work answers nothing when it failed
 * @returns {Promise<T | undefined>}
 */
export async function stepWithOutput(label, work) {
  const begin = performance.now();
  const answer = await work();
  if (answer !== undefined) console.log(`${label} … ${secondsSince(begin)}`);
  return answer;
}
