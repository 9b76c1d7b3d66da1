/**
 * @typedef {object} Totals
 * @property {number} passed
 * @property {number} failed
 */

/**
 * @typedef {object} VitestReport what vitest's JSON reporter writes
 * @property {number} numPassedTests
 * @property {number} numFailedTests
 * @property {Array<{ status: string, assertionResults: unknown[] }>} testResults one a spec file
 */

/** @param {Totals[]} all @returns {Totals} */
export function addTotals(all) {
  return {
    passed: all.reduce((sum, { passed }) => sum + passed, 0),
    failed: all.reduce((sum, { failed }) => sum + failed, 0),
  };
}

/**
 * The true totals of a vitest run: a spec file that could not be read counts as one failure, and so does a run that
 * ended badly without naming a failure (an unhandled error, a kill, no report at all).
 * @param {VitestReport | null} report
 * @param {number} exitCode
 * @returns {Totals}
 */
export function vitestTotals(report, exitCode) {
  const passed = report?.numPassedTests ?? 0;
  const unread =
    report?.testResults.filter(
      ({ status, assertionResults }) => status === 'failed' && assertionResults.length === 0,
    ).length ?? 0;
  const failed = (report?.numFailedTests ?? 0) + unread;
  const unnamed = failed === 0 && (exitCode !== 0 || passed === 0);
  return { passed, failed: unnamed ? 1 : failed };
}

/** The last line of a run. @param {Totals} totals */
export const summary = ({ passed, failed }) => `${passed} passed, ${failed} failed`;
