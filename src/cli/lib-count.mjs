/** Counts of tests out of the reporters' JSON, so that the last line of `npm test` is true. */

/** @typedef {{ passed: number, failed: number, skipped: number }} Count */

/** A step without tests of its own (a linter, a type check) counts as one. */
export function countExit(/** @type {number} */ code) {
  return code === 0 ? { passed: 1, failed: 0, skipped: 0 } : { passed: 0, failed: 1, skipped: 0 };
}

/**
 * Counts a vitest JSON report. A file that could not be loaded holds no test and counts as one failed.
 * @param {{ numPassedTests: number, numFailedTests: number, numPendingTests: number, numTodoTests: number,
 *   testResults: { status: string, assertionResults: unknown[] }[] }} report
 */
export function countVitest(report) {
  const broken = report.testResults.filter((file) => file.status === 'failed' && file.assertionResults.length === 0);
  return {
    passed: report.numPassedTests,
    failed: report.numFailedTests + broken.length,
    skipped: report.numPendingTests + report.numTodoTests,
  };
}

/**
 * Counts a Playwright JSON report. A test that passed only on a second try is a failure.
 * @param {{ stats: { expected: number, unexpected: number, flaky: number, skipped: number } }} report
 */
export function countPlaywright({ stats }) {
  return { passed: stats.expected, failed: stats.unexpected + stats.flaky, skipped: stats.skipped };
}

/**
 * What a test runner's step counts: a run that ended badly has at least one failure, and a run without tests failed.
 * @param {Count | null} count null when there is no readable report
 * @param {number} code exit code of the runner
 * @returns {Count}
 */
export function countRun(count, code) {
  const known = count ?? { passed: 0, failed: 0, skipped: 0 };
  const wrong = code !== 0 || known.passed + known.failed === 0;
  return wrong && known.failed === 0 ? { ...known, failed: 1 } : known;
}

/** @returns {Count} */
export function sumCounts(/** @type {readonly Count[]} */ counts) {
  return counts.reduce(
    (sum, count) => ({
      passed: sum.passed + count.passed,
      failed: sum.failed + count.failed,
      skipped: sum.skipped + count.skipped,
    }),
    { passed: 0, failed: 0, skipped: 0 },
  );
}

/** The line itself: "12 passed, 0 failed", with ", 3 skipped" when some were. */
export function countLine(/** @type {Count} */ { passed, failed, skipped }) {
  return `${passed} passed, ${failed} failed${skipped > 0 ? `, ${skipped} skipped` : ''}`;
}
