/** What the test runner reports, as the line that closes npm test. */

/** @typedef {{ passed: number, failed: number, skipped: number }} Tally */

/**
 * Count the runner's own JSON report.
 *
 * @param {string} text @returns {Tally | null} null when it is not such a report
 */
export function tallyOf(text) {
  let report
  try {
    report = JSON.parse(text)
  } catch {
    return null
  }
  if (typeof report?.numPassedTests !== 'number' || !Array.isArray(report.testResults)) return null
  // A file that could not be loaded has failed without a failed test in it: it counts as one.
  const broken = report.testResults.filter(
    (/** @type {{ status?: string, assertionResults?: { status?: string }[] }} */ file) =>
      file.status === 'failed' && !file.assertionResults?.some((test) => test.status === 'failed'),
  ).length
  return {
    passed: report.numPassedTests,
    failed: report.numFailedTests + broken,
    skipped: (report.numPendingTests ?? 0) + (report.numTodoTests ?? 0),
  }
}

/** @param {Tally} tally @returns {string} */
export function tallyLine({ passed, failed, skipped }) {
  return `${passed} passed, ${failed} failed${skipped > 0 ? `, ${skipped} skipped` : ''}`
}
