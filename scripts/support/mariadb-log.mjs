const fullDisk = /No space left|disk is full|errno(:| )28|Error number 28|Errcode: 28/i;
const takenPort = /Address already in use|port is already in use/i;
const noise = /Aborting|Plugin .* (init|registration)|Failed to initialize plugins/;

/** @returns {boolean} whether the log says that it stopped, or waits, for lack of space */
export const saysDiskFull = (/** @type {string} */ log) => fullDisk.test(log);

/** @returns {boolean} whether someone else took the port between picking and binding it */
export const saysPortTaken = (/** @type {string} */ log) => takenPort.test(log);

/**
 * The one line of an error log that tells why MariaDB ended.
 *
 * @param {string} log
 * @returns {string} a sentence
 */
export function sentenceFromLog(log) {
  if (saysDiskFull(log)) return 'the disk is full.';
  const errors = log.split('\n').filter((line) => line.includes('[ERROR]') && !noise.test(line));
  const first = errors[0]?.replace(/^.*\[ERROR\] /, '').replace(/^(mariadbd|mysqld): /, '');
  return first ? `${first.replace(/\.?$/, '')}.` : 'it gave no reason.';
}
