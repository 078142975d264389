/**
 * `npm test`: installs where needed, type-checks, lints, builds, runs all tests, and ends with a line
 * `N passed, N failed`. Plain JavaScript without dependencies: it runs before anything is installed.
 */
import { spawnSync } from 'node:child_process';
import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { ensureInstalled, projectFolder } from '../src/cli/bootstrap/install.mjs';
import { ensureChromium } from './runner/chromium.mjs';
import { addTally, emptyTally, readPlaywrightReport, readVitestReport } from './runner/reports.mjs';

const total = emptyTally();
const reports = mkdtempSync(join(tmpdir(), 'rimlight-test-'));
try {
  runEverything();
} finally {
  rmSync(reports, { recursive: true, force: true });
}
printTotal();

function runEverything() {
  if (!ensureInstalled()) {
    total.failed.push('installation of the dependencies');
    return;
  }
  runCheck('types', node('node_modules/typescript/bin/tsc', '--noEmit'));
  runCheck('lint and format', node('node_modules/@biomejs/biome/bin/biome', 'ci', '.'));
  const isBuilt = runCheck('build', node('src/cli/bootstrap/build.mjs'));
  runVitest();
  if (isBuilt) runBrowserTests();
  else total.failed.push('browser tests: there is no build to test');
}

/** A check that is one test by itself. */
function runCheck(name, [program, ...args]) {
  heading(name);
  const isPassed = run(program, args).status === 0;
  if (isPassed) total.passed++;
  else total.failed.push(name);
  return isPassed;
}

function runVitest() {
  heading('unit, property and reference tests');
  const file = join(reports, 'vitest.json');
  const [program, ...args] = node(
    'node_modules/vitest/vitest.mjs',
    'run',
    '--reporter=default',
    '--reporter=json',
    `--outputFile.json=${file}`,
  );
  const { status } = run(program, args);
  addRunner('unit tests', readVitestReport(file, projectFolder), status);
}

function runBrowserTests() {
  heading('browser tests');
  const chromium = ensureChromium();
  if (chromium === null) {
    total.failed.push('browser tests: no Chromium');
    return;
  }
  const file = join(reports, 'playwright.json');
  const [program, ...args] = node(
    'node_modules/@playwright/test/cli.js',
    'test',
    '--reporter=list,json',
  );
  const { status } = run(program, args, {
    CHROMIUM_PATH: chromium,
    PLAYWRIGHT_JSON_OUTPUT_NAME: file,
  });
  addRunner('browser tests', readPlaywrightReport(file), status);
}

/** A runner that fails without naming a test (it crashed, or found none) has failed all the same. */
function addRunner(name, tally, status) {
  if (status !== 0 && tally.failed.length === 0) {
    tally.failed.push(`${name}: the runner ended with ${status ?? 'a signal'}`);
  }
  if (status === 0 && tally.passed === 0) tally.failed.push(`${name}: none were run`);
  addTally(total, tally);
}

function printTotal() {
  const { passed, failed, notRun } = total;
  process.stdout.write('\n');
  if (failed.length > 0) process.stdout.write(`Failed:\n${listed(failed)}`);
  if (notRun.length > 0) {
    process.stdout.write(
      `Not run, and not counted (they need files that are not beside this checkout):\n${listed(notRun)}`,
    );
  }
  process.stdout.write(`${passed} passed, ${failed.length} failed\n`);
  process.exitCode = failed.length === 0 ? 0 : 1;
}

function listed(names) {
  return names.map((name) => `  ${name}\n`).join('');
}

function heading(name) {
  process.stdout.write(`\n== ${name}\n`);
}

function node(script, ...args) {
  return [process.execPath, join(projectFolder, script), ...args];
}

function run(program, args, env = {}) {
  return spawnSync(program, args, {
    cwd: projectFolder,
    stdio: ['ignore', 'inherit', 'inherit'],
    env: { ...process.env, ...env },
  });
}
