import { existsSync, readFileSync } from 'node:fs';

/** @typedef {{ passed: number, failed: number, skipped: number }} TestCounts */

/**
 * @param {TestCounts} a
 * @param {TestCounts} b
 * @returns {TestCounts}
 */
export function addCounts(a, b) {
  return { passed: a.passed + b.passed, failed: a.failed + b.failed, skipped: a.skipped + b.skipped };
}

/**
 * The closing line of a test run.
 *
 * @param {TestCounts} counts
 */
export function describeCounts({ passed, failed, skipped }) {
  return `${passed} passed, ${failed} failed${skipped > 0 ? `, ${skipped} skipped` : ''}`;
}

/**
 * Counts checks that are no tests, each by its exit code.
 *
 * @param {Record<string, number>} exitCodes
 * @returns {TestCounts}
 */
export function countChecks(exitCodes) {
  const codes = Object.values(exitCodes);
  const passed = codes.filter((code) => code === 0).length;
  return { passed, failed: codes.length - passed, skipped: 0 };
}

/**
 * Counts the tests of a vitest report (its JSON reporter). What vitest fails for without a failed test counts as one:
 * a file that could not be loaded, an error outside every test, no report, or no test at all.
 *
 * @param {string} path of the report
 * @param {number} exitCode vitest's own
 * @returns {TestCounts}
 */
export function countVitestReport(path, exitCode) {
  if (!existsSync(path)) {
    return { passed: 0, failed: 1, skipped: 0 };
  }
  /** @type {{ testResults: { name: string, status: string, assertionResults: { status: string }[] }[] }} */
  const report = JSON.parse(readFileSync(path, 'utf8'));
  const counts = { passed: 0, failed: 0, skipped: 0 };
  for (const file of report.testResults) {
    for (const { status } of file.assertionResults) counts[sortStatus(status)] += 1;
    const noneFailed = !file.assertionResults.some(({ status }) => status === 'failed');
    if (file.status === 'failed' && noneFailed) counts.failed += 1;
  }
  if (counts.failed === 0 && (exitCode !== 0 || counts.passed === 0)) {
    counts.failed = 1;
  }
  return counts;
}

/**
 * @param {string} status
 * @returns {'passed' | 'failed' | 'skipped'}
 */
function sortStatus(status) {
  if (status === 'passed' || status === 'failed') return status;
  return 'skipped';
}
