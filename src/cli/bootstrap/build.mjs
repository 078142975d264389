/**
 * `npm run build`: the app into dist/app, the command line into dist/cli. With `--if-stale`, only
 * where sources are newer than the last build.
 */
import { spawnSync } from 'node:child_process';
import {
  chmodSync,
  cpSync,
  existsSync,
  mkdirSync,
  readdirSync,
  rmSync,
  statSync,
  utimesSync,
  writeFileSync,
} from 'node:fs';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { projectFolder } from './install.mjs';

const inProject = (...parts) => join(projectFolder, ...parts);

/** What the build is made from. */
const sources = [
  ...['src', 'workers', 'public', 'sample-data'],
  ...['index.html', 'vite.config.ts', 'asconfig.json', 'package.json', 'package-lock.json'],
];
/** Written last; its time is the start of the build, so that an edit made meanwhile counts as newer. */
const stamp = inProject('dist', 'built');

/** Builds app and command line, whatever is there. */
export async function buildAll() {
  const startedAt = new Date();
  const { build } = await import('vite');
  rmSync(inProject('dist'), { recursive: true, force: true });
  for (const mode of ['production', 'cli']) {
    await build({ root: projectFolder, mode, logLevel: 'warn' });
  }
  copySamples();
  chmodSync(inProject('dist', 'cli', 'rimlight.js'), 0o755);
  writeFileSync(stamp, '');
  utimesSync(stamp, startedAt, startedAt);
}

/**
 * Builds in a process of its own, so that the bundler's memory goes with it, and only where needed.
 *
 * @returns true when the build is there; a false is already told on standard error
 */
export function ensureBuilt() {
  if (existsSync(stamp) && newestChange() < statSync(stamp).mtimeMs) return true;
  process.stderr.write('Building …\n');
  const { status } = spawnSync(process.execPath, [fileURLToPath(import.meta.url)], {
    cwd: projectFolder,
    stdio: ['ignore', 2, 2],
  });
  return status === 0;
}

/** Demo scans are served beside the app; only scans and their recipes. */
function copySamples() {
  const target = inProject('dist', 'app', 'sample-data');
  mkdirSync(target, { recursive: true });
  for (const name of readdirSync(inProject('sample-data'))) {
    if (/\.(h5|recipe\.json)$/.test(name))
      cpSync(inProject('sample-data', name), join(target, name));
  }
}

function newestChange() {
  const times = sources.flatMap(filesOf).map((path) => statSync(path).mtimeMs);
  return Math.max(0, ...times);
}

/** The recipe's schema is written by the build itself. */
function filesOf(source) {
  const path = inProject(source);
  if (!existsSync(path)) return [];
  if (statSync(path).isFile()) return [path];
  return readdirSync(path, { recursive: true, withFileTypes: true })
    .filter((entry) => entry.isFile() && entry.name !== 'recipe.schema.json')
    .map((entry) => join(entry.parentPath, entry.name));
}

if (process.argv[1] === fileURLToPath(import.meta.url)) {
  if (process.argv.includes('--if-stale')) process.exitCode = ensureBuilt() ? 0 : 1;
  else await buildOrTell();
}

async function buildOrTell() {
  try {
    await buildAll();
  } catch (error) {
    process.stderr.write(`rimlight: the build failed. ${error.message}\n`);
    process.exitCode = 1;
  }
}
