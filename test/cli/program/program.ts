/** Runs the built program as a user does, in a process of its own. */
import { type ChildProcess, spawn } from 'node:child_process';
import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { afterAll } from 'vitest';

const inProject = (path: string): string =>
  fileURLToPath(new URL(`../../../${path}`, import.meta.url));

export const programPath = inProject('dist/cli/rimlight.js');
export const demoScan = inProject('sample-data/tent-field.h5');
export const demoRecipe = inProject('sample-data/tent-field.recipe.json');

export interface Outcome {
  /** null when ended by a signal */
  readonly code: number | null;
  readonly out: string;
  readonly err: string;
}

export function start(words: readonly string[], cwd?: string): ChildProcess {
  return spawn(process.execPath, [programPath, ...words], { ...(cwd !== undefined && { cwd }) });
}

export async function outcomeOf(child: ChildProcess): Promise<Outcome> {
  const said = { out: '', err: '' };
  child.stdout?.on('data', (part) => {
    said.out += String(part);
  });
  child.stderr?.on('data', (part) => {
    said.err += String(part);
  });
  const code = await new Promise<number | null>((resolve) => child.once('close', resolve));
  return { code, ...said };
}

export function rimlight(...words: readonly string[]): Promise<Outcome> {
  return outcomeOf(start(words));
}

/** A folder for one test file, gone when its tests are. */
export function temporaryFolder(): string {
  const folder = mkdtempSync(join(tmpdir(), 'rimlight-program-'));
  afterAll(() => rmSync(folder, { recursive: true, force: true }));
  return folder;
}
