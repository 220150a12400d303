import { readFileSync } from 'node:fs';

/**
 * Counts a test run from its report. Whatever went wrong outside a test (a file that does not load, a stray
 * rejection, no report, no test at all, a test left out) counts as a failure, so that nothing can hide.
 */
export function tally(reportFile, exitCode) {
  let report;
  try {
    report = JSON.parse(readFileSync(reportFile, 'utf8'));
  } catch {
    return { passed: 0, failed: 1 };
  }
  let passed = 0;
  let failed = 0;
  for (const file of report.testResults) {
    const good = file.assertionResults.filter((t) => t.status === 'passed').length;
    const others = file.assertionResults.length - good;
    passed += good;
    failed += others === 0 && file.status !== 'passed' ? 1 : others;
  }
  if (failed === 0 && (exitCode !== 0 || passed === 0)) failed = 1;
  return { passed, failed };
}
