/** The reports of the two test runners, brought to one form: how many passed, which failed, which were not run. */
import { existsSync, readFileSync } from 'node:fs';
import { relative } from 'node:path';

/** @typedef {{ passed: number, failed: string[], notRun: string[] }} Tally */

/** @returns {Tally} */
export function emptyTally() {
  return { passed: 0, failed: [], notRun: [] };
}

/** @param {Tally} total @param {Tally} tally */
export function addTally(total, tally) {
  total.passed += tally.passed;
  total.failed.push(...tally.failed);
  total.notRun.push(...tally.notRun);
}

/** @returns {Tally} */
export function readVitestReport(path, folder) {
  const tally = emptyTally();
  const report = readJson(path);
  if (report === null) return tally;
  for (const file of report.testResults) {
    const name = relative(folder, file.name);
    for (const test of file.assertionResults) {
      count(tally, test.status === 'passed', test.status === 'failed', `${name}: ${test.fullName}`);
    }
    // A file that could not be loaded has no tests of its own to fail.
    if (
      file.status === 'failed' &&
      !file.assertionResults.some(({ status }) => status === 'failed')
    ) {
      tally.failed.push(`${name}: ${firstLine(file.message)}`);
    }
  }
  return tally;
}

/** @returns {Tally} */
export function readPlaywrightReport(path) {
  const tally = emptyTally();
  const report = readJson(path);
  if (report === null) return tally;
  for (const error of report.errors)
    tally.failed.push(`browser tests: ${firstLine(error.message)}`);
  for (const suite of report.suites) countSuite(tally, suite, []);
  return tally;
}

function countSuite(tally, suite, titles) {
  const here = [...titles, suite.title];
  for (const spec of suite.specs ?? []) {
    const name = [...here, spec.title].join(' › ');
    for (const { status } of spec.tests) {
      count(tally, status === 'expected', status === 'unexpected' || status === 'flaky', name);
    }
  }
  for (const inner of suite.suites ?? []) countSuite(tally, inner, here);
}

function count(tally, isPassed, isFailed, name) {
  if (isPassed) tally.passed++;
  else if (isFailed) tally.failed.push(name);
  else tally.notRun.push(name);
}

function readJson(path) {
  return existsSync(path) ? JSON.parse(readFileSync(path, 'utf8')) : null;
}

function firstLine(text) {
  return (
    String(text ?? '')
      .trim()
      .split('\n')[0] || 'failed without a message'
  );
}
