// What a part of the tests came to, read from vitest's own report.
import { readJson } from './files.mjs';

/**
 * Counts of a vitest report as `{passed, failed, why}`. A part that crashed, left a file unread,
 * skipped a test or ran none has failed, whatever the report says.
 */
export function tallyOf(reportFile, exitCode) {
  const report = readJson(reportFile, undefined);
  if (!report) return { passed: 0, failed: 1, why: [`ended with ${exitCode} and left no report`] };
  const passed = report.numPassedTests;
  const why = [];
  let failed = report.numFailedTests;
  const add = (count, reason) => {
    failed += count;
    if (count > 0) why.push(reason(count));
  };
  const unread = report.testResults.filter(
    (file) => file.status === 'failed' && file.assertionResults.every((t) => t.status !== 'failed'),
  );
  add(unread.length, (n) => `${n} test files could not be run`);
  add(report.numPendingTests + report.numTodoTests, (n) => `${n} tests were left out`);
  if (passed + failed === 0) add(1, () => 'no test ran');
  if (exitCode !== 0 && failed === 0) add(1, () => `ended with ${exitCode}`);
  return { passed, failed, why };
}

/** Sum of parts. */
export const total = (parts) =>
  parts.reduce(
    (sum, part) => ({ passed: sum.passed + part.passed, failed: sum.failed + part.failed }),
    { passed: 0, failed: 0 },
  );
