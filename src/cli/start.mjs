/**
 * `npm start`: installs and builds where needed, then serves the app with the demo scan on loopback.
 * Everything after `--` goes to `rimlight serve`: `npm start -- my-scan.h5`.
 */

import { join } from 'node:path';
import { pathToFileURL } from 'node:url';
import { ensureBuilt } from './bootstrap/build.mjs';
import { ensureInstalled, projectFolder } from './bootstrap/install.mjs';

if (ensureInstalled() && ensureBuilt()) {
  const program = join(projectFolder, 'dist', 'cli', 'rimlight.js');
  // In this process, so that Ctrl-C reaches the server itself.
  process.argv = [process.execPath, program, 'serve', ...process.argv.slice(2)];
  await import(pathToFileURL(program).href);
} else {
  process.exitCode = 1;
}
