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
    console.log(`${((performance.now() - begin) / 1000).toFixed(1)} s`);
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
