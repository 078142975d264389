/** `npm test` counts what the two runners report; a failure that is not counted would be a lie. */
import { spawnSync } from 'node:child_process';
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { readPlaywrightReport, readVitestReport } from './reports.mjs';

let folder = '';
const projectFolder = fileURLToPath(new URL('../..', import.meta.url));

beforeAll(() => {
  folder = mkdtempSync(join(tmpdir(), 'rimlight-reports-'));
});
afterAll(() => rmSync(folder, { recursive: true }));

function saved(name: string, report: unknown): string {
  const path = join(folder, name);
  writeFileSync(path, JSON.stringify(report));
  return path;
}

/** Runs the real runner on a made-up test file, and reads its report. */
function vitestReportOf(name: string, source: string) {
  const file = join(folder, `${name}.test.mjs`);
  writeFileSync(file, source);
  const report = join(folder, `${name}.json`);
  const vitest = join(projectFolder, 'node_modules', 'vitest', 'vitest.mjs');
  const { status } = spawnSync(
    process.execPath,
    [
      vitest,
      'run',
      '--root',
      folder,
      '--globals',
      '--reporter=json',
      `--outputFile=${report}`,
      file,
    ],
    { env: { ...process.env, VITEST: undefined }, stdio: 'ignore' },
  );
  return { status, tally: readVitestReport(report, folder) };
}

describe('readVitestReport', () => {
  it('counts passed, failed and not run', () => {
    const { status, tally } = vitestReportOf(
      'mixed',
      `it('adds', () => {});
       describe('maps', () => { it('agree', () => { expect(1).toBe(2); }); });
       it.runIf(false)('reads a measured scan', () => {});`,
    );
    expect(status).toBe(1);
    expect(tally).toEqual({
      passed: 1,
      failed: ['mixed.test.mjs: maps agree'],
      notRun: ['mixed.test.mjs: reads a measured scan'],
    });
  });

  it('counts a file that cannot be loaded as one failure, with its reason', () => {
    const { tally } = vitestReportOf('unloadable', "throw new Error('no such fixture');");
    expect(tally.passed).toBe(0);
    expect(tally.failed).toEqual([expect.stringContaining('no such fixture')]);
  });

  it('finds nothing where there is no report', () => {
    expect(readVitestReport(join(folder, 'none.json'), folder)).toEqual({
      passed: 0,
      failed: [],
      notRun: [],
    });
  });
});

describe('readPlaywrightReport', () => {
  it('counts every spec of nested suites, a flaky one as failed', () => {
    const spec = (title: string, status: string) => ({ title, tests: [{ status }] });
    const report = {
      errors: [],
      suites: [
        {
          title: 'open.spec.ts',
          specs: [spec('opens', 'expected')],
          suites: [
            {
              title: 'bands',
              specs: [spec('drag', 'unexpected'), spec('snap', 'flaky'), spec('later', 'skipped')],
            },
          ],
        },
      ],
    };
    expect(readPlaywrightReport(saved('browser.json', report))).toEqual({
      passed: 1,
      failed: ['open.spec.ts › bands › drag', 'open.spec.ts › bands › snap'],
      notRun: ['open.spec.ts › bands › later'],
    });
  });

  it('counts an error outside of any test', () => {
    const report = { errors: [{ message: 'the server did not start\n  at …' }], suites: [] };
    expect(readPlaywrightReport(saved('broken.json', report)).failed).toEqual([
      'browser tests: the server did not start',
    ]);
  });
});
