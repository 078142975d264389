/**
 * Installs the dependencies where they are missing or not those of the lock file. Plain JavaScript
 * without dependencies: it runs before there is anything to compile with.
 */
import { spawnSync } from 'node:child_process';
import { existsSync, lstatSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';

/** The folder of package.json. */
export const projectFolder = fileURLToPath(new URL('../../..', import.meta.url));

/**
 * @returns true when the dependencies are there; a false is already told on standard error
 */
export function ensureInstalled() {
  if (!isNodeNewEnough()) return false;
  if (isInstalled()) return true;
  process.stderr.write('Installing the dependencies (once) …\n');
  const { status, error } = spawnSync(
    'npm',
    ['ci', '--no-fund', '--no-audit', '--loglevel=error'],
    {
      cwd: projectFolder,
      // Their words belong to standard error: what the command itself prints stays clean.
      stdio: ['ignore', 2, 2],
      env: { ...process.env, NODE_ENV: 'development' },
    },
  );
  if (status === 0) return true;
  const reason = error === undefined ? `npm ci ended with ${status}` : error.message;
  process.stderr.write(
    `rimlight: the dependencies could not be installed (${reason}). Check the network and run \`npm ci\`.\n`,
  );
  return false;
}

/**
 * Whether every package of the lock file is there in its version. npm writes its list of what is
 * installed last, so a broken-off installation has none. A linked folder is somebody else's: `npm ci`
 * would empty it, so it is taken as it is.
 */
function isInstalled() {
  const folder = join(projectFolder, 'node_modules');
  if (lstatSync(folder, { throwIfNoEntry: false })?.isSymbolicLink()) return true;
  const list = join(folder, '.package-lock.json');
  if (!existsSync(list)) return false;
  const installed = readJson(list).packages;
  const wanted = Object.entries(readJson(join(projectFolder, 'package-lock.json')).packages);
  return wanted.every(([place, { version, optional }]) => {
    const isRoot = place === '';
    return isRoot || (installed[place] ? installed[place].version === version : optional === true);
  });
}

function readJson(path) {
  return JSON.parse(readFileSync(path, 'utf8'));
}

function isNodeNewEnough() {
  const { engines } = readJson(join(projectFolder, 'package.json'));
  const [, ...least] = /(\d+)\.(\d+)/.exec(engines.node).map(Number);
  const [major, minor] = process.versions.node.split('.').map(Number);
  if (major > least[0] || (major === least[0] && minor >= least[1])) return true;
  process.stderr.write(
    `rimlight: Node ${process.versions.node} is too old (${process.execPath}). Use Node ${least.join('.')} or newer.\n`,
  );
  return false;
}
