/** Finds a Chromium for the browser tests, or installs one where that is possible without asking. */
import { spawnSync } from 'node:child_process';
import { accessSync, constants } from 'node:fs';
import { delimiter, join } from 'node:path';

const names = ['chromium', 'chromium-browser', 'google-chrome', 'google-chrome-stable'];

/** @returns {string | null} path of the browser; null is already told on standard error */
export function ensureChromium() {
  const found = findChromium();
  if (found !== null) return found;
  if (installByApt()) {
    const installed = findChromium();
    if (installed !== null) return installed;
  }
  process.stderr.write(
    'No Chromium was found for the browser tests. Install one (apt-get install chromium), or name it in CHROMIUM_PATH.\n',
  );
  return null;
}

function findChromium() {
  const { CHROMIUM_PATH, PATH = '' } = process.env;
  if (CHROMIUM_PATH) return isExecutable(CHROMIUM_PATH) ? CHROMIUM_PATH : null;
  const folders = ['/usr/bin', ...PATH.split(delimiter)];
  const candidates = names.flatMap((name) => folders.map((folder) => join(folder, name)));
  return candidates.find(isExecutable) ?? null;
}

function isExecutable(path) {
  try {
    accessSync(path, constants.X_OK);
    return true;
  } catch {
    return false;
  }
}

/** As root, or where sudo asks no password. */
function installByApt() {
  if (process.env.CHROMIUM_PATH || !isThere('apt-get')) return false;
  const isRoot = process.getuid?.() === 0;
  if (!isRoot && !isThere('sudo')) return false;
  if (!isRoot && spawnSync('sudo', ['-n', 'true'], { stdio: 'ignore' }).status !== 0) return false;
  process.stderr.write('Installing Chromium for the browser tests (once) …\n');
  const apt = (...words) => {
    const command = ['apt-get', '-q', '-y', ...words];
    const [program, ...rest] = isRoot ? command : ['sudo', '-n', ...command];
    const env = { ...process.env, DEBIAN_FRONTEND: 'noninteractive' };
    const { status, stdout, stderr } = spawnSync(program, rest, { env, encoding: 'utf8' });
    if (status !== 0) process.stderr.write(`${stdout ?? ''}${stderr ?? ''}`);
    return status === 0;
  };
  return apt('update') && apt('install', '--no-install-recommends', 'chromium');
}

function isThere(program) {
  return (process.env.PATH ?? '')
    .split(delimiter)
    .some((folder) => isExecutable(join(folder, program)));
}
