/** @typedef {{ title: string, passed: number, failed: number }} Outcome */

/**
 * A check that passes or fails as a whole counts as one.
 *
 * @param {string} title
 * @param {boolean} isPassed
 * @returns {Outcome}
 */
export function checkOutcome(title, isPassed) {
  return { title, passed: isPassed ? 1 : 0, failed: isPassed ? 0 : 1 };
}

/**
 * The tests of one suite, counted. A file that could not be loaded counts as one failure, and so does a run that ended
 * badly though every test in its report passed: an error outside the tests, or a report that was never written.
 *
 * @param {string} title
 * @param {Report | null} report what vitest's JSON reporter wrote; null when it wrote nothing
 * @param {number} status vitest's exit status
 * @returns {Outcome}
 *
 * @typedef {{ testResults: { status: string, assertionResults: { status: string }[] }[] }} Report
 */
export function vitestOutcome(title, report, status) {
  const files = report?.testResults ?? [];
  const tests = files.flatMap(({ assertionResults }) => assertionResults);
  const passed = tests.filter((test) => test.status === "passed").length;
  const failedTests = tests.filter((test) => test.status === "failed").length;
  const brokenFiles = files.filter(
    (file) => file.status === "failed" && !file.assertionResults.some((test) => test.status === "failed"),
  ).length;
  const failed = failedTests + brokenFiles;
  const isSuspicious = failed === 0 && (status !== 0 || passed === 0);
  return { title, passed, failed: isSuspicious ? 1 : failed };
}

/**
 * @param {readonly Outcome[]} outcomes
 * @returns {string} the line that a test run ends with
 * @example lastLine([{ title: "lint", passed: 1, failed: 0 }]) // "1 passed, 0 failed"
 */
export function lastLine(outcomes) {
  const sum = (/** @type {"passed" | "failed"} */ key) => outcomes.reduce((total, outcome) => total + outcome[key], 0);
  return `${sum("passed")} passed, ${sum("failed")} failed`;
}
