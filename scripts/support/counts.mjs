/** @typedef {{ passed: number, failed: number, skipped: number }} Counts */

const sum = (one, other) => ({
  passed: one.passed + other.passed,
  failed: one.failed + other.failed,
  skipped: one.skipped + other.skipped,
});

/** @returns {Counts} */
export const total = (/** @type {Counts[]} */ counts) => counts.reduce(sum, { passed: 0, failed: 0, skipped: 0 });

/** @returns {Counts} of a check that is one thing: it passed or it failed */
export const one = (/** @type {boolean} */ passed) => ({ passed: Number(passed), failed: Number(!passed), skipped: 0 });

const isFileFault = ({ status, assertionResults }) =>
  status === 'failed' && !assertionResults.some((assertion) => assertion.status === 'failed');

/**
 * Counts a run of Vitest. A file that failed outside its tests counts as one failure, and so does a run that failed
 * without saying where.
 *
 * @param {{ numPassedTests: number, numFailedTests: number, numPendingTests: number, numTodoTests: number,
 *   testResults: { status: string, assertionResults: { status: string }[] }[] } | undefined} report what its json
 *   reporter wrote; undefined: nothing
 * @param {number} exitCode
 * @returns {Counts}
 */
export function countsOfReport(report, exitCode) {
  if (!report) return one(false);
  const failed = report.numFailedTests + report.testResults.filter(isFileFault).length;
  return {
    passed: report.numPassedTests,
    failed: failed === 0 && exitCode !== 0 ? 1 : failed,
    skipped: report.numPendingTests + report.numTodoTests,
  };
}
