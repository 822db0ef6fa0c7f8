/**
 * What a run of vitest comes to. A run that failed never counts as 0 failed, whatever its report says.
 * @param {{ numPassedTests: number, numFailedTests: number,
 *   testResults: { status: string, assertionResults: { status: string }[] }[] } | null} report null when there is none
 * @param {number} code the exit code
 * @returns {{ passed: number, failed: number }}
 */
export function sumResults(report, code) {
  if (!report) return { passed: 0, failed: 1 }
  // A file that could not be read, or whose set-up failed, has no failed test of its own.
  const broken = report.testResults.filter(
    (file) => file.status === 'failed' && !file.assertionResults.some((test) => test.status === 'failed'),
  )
  const failed = report.numFailedTests + broken.length
  const passed = report.numPassedTests
  return { passed, failed: failed === 0 && (code !== 0 || passed === 0) ? 1 : failed }
}
