/**
 * Installs the dependencies when they are missing or older than the lock file. Plain JavaScript
 * without dependencies: it runs before there is anything to compile with.
 */
import { spawnSync } from 'node:child_process';
import { existsSync, readFileSync, statSync } from 'node:fs';
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

/** npm writes the hidden lock file last, so a broken-off installation has none. */
function isInstalled() {
  const installed = join(projectFolder, 'node_modules', '.package-lock.json');
  const wanted = join(projectFolder, 'package-lock.json');
  return existsSync(installed) && statSync(installed).mtimeMs >= statSync(wanted).mtimeMs;
}

function isNodeNewEnough() {
  const { engines } = JSON.parse(readFileSync(join(projectFolder, 'package.json'), 'utf8'));
  const [, ...least] = /(\d+)\.(\d+)/.exec(engines.node).map(Number);
  const [major, minor] = process.versions.node.split('.').map(Number);
  if (major > least[0] || (major === least[0] && minor >= least[1])) return true;
  process.stderr.write(
    `rimlight: Node ${process.versions.node} is too old (${process.execPath}). Use Node ${least.join('.')} or newer.\n`,
  );
  return false;
}
