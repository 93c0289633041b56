/**
 * Counts the tests of a vitest JSON report. A file that failed before its tests could run counts as a failure,
 * and so does a run that ended badly although no test failed: a crash must not look like success.
 *
 * @param {string | undefined} text the report, if vitest came to write one
 * @param {boolean} passed whether vitest ended with exit code 0
 * @returns {{ passed: number, failed: number, skipped: number }}
 */
export function countTests(text, passed) {
  const report = parse(text);
  if (!report) return { passed: 0, failed: 1, skipped: 0 };
  const brokenFiles = report.testResults.filter(
    (file) => file.status === 'failed' && !file.assertionResults.some((test) => test.status === 'failed'),
  ).length;
  let failed = report.numFailedTests + brokenFiles;
  if (failed === 0 && (!passed || report.numPassedTests === 0)) failed = 1;
  return { passed: report.numPassedTests, failed, skipped: report.numPendingTests + report.numTodoTests };
}

function parse(text) {
  try {
    return text === undefined ? undefined : JSON.parse(text);
  } catch {
    return undefined;
  }
}
