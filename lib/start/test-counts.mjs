// Reads the runners' reports. Whatever was not run counts as failed: a test that is skipped shows nothing.

/**
 * Counts of a vitest JSON report. A fault outside a test, or a file that could not be loaded, counts as one failure.
 * @returns {{ passed: number, failed: number }}
 */
export function countUnitTests(report) {
  const passed = report.numPassedTests
  const notRun = report.numTotalTests - report.numPassedTests
  const brokenFiles = report.testResults.filter((file) => file.status === 'failed' && file.assertionResults.length === 0).length
  const failed = notRun + brokenFiles
  return { passed, failed: failed === 0 && (!report.success || passed === 0) ? 1 : failed }
}

/**
 * Counts of a Playwright JSON report. Flaky and skipped tests count as failed.
 * @returns {{ passed: number, failed: number }}
 */
export function countBrowserTests(report) {
  const { expected, unexpected, flaky, skipped } = report.stats
  const failed = unexpected + flaky + skipped
  const isBroken = failed === 0 && (report.errors.length > 0 || expected === 0)
  return { passed: expected, failed: isBroken ? 1 : failed }
}
