import { existsSync, readFileSync } from 'node:fs';

const read = (file) => (existsSync(file) ? JSON.parse(readFileSync(file, 'utf8')) : null);

/** Passed and failed of Vitest's JSON report; a file that could not be loaded, or a failure outside a test, counts as one. */
export function vitestCounts(file, code) {
  const report = read(file);
  if (!report) return { passed: 0, failed: 1 };
  const broken = report.testResults.filter((one) => one.status === 'failed' && one.assertionResults.every((test) => test.status !== 'failed'));
  const failed = report.numFailedTests + broken.length;
  return { passed: report.numPassedTests, failed: failed === 0 && code !== 0 ? 1 : failed };
}

/** Passed and failed of Playwright's JSON report. */
export function playwrightCounts(file, code) {
  const report = read(file);
  if (!report) return { passed: 0, failed: code === 0 ? 0 : 1 };
  const { expected, unexpected, flaky } = report.stats;
  const failed = unexpected + flaky;
  return { passed: expected, failed: failed === 0 && code !== 0 ? 1 : failed };
}
