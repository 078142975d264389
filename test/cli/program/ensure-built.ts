/** Before the tests of the command line: a build, where sources are newer than the last one. */
import { spawnSync } from 'node:child_process';
import { fileURLToPath } from 'node:url';

export function setup(): void {
  const script = fileURLToPath(new URL('../../../src/cli/bootstrap/build.mjs', import.meta.url));
  const { status } = spawnSync(process.execPath, [script, '--if-stale'], {
    stdio: ['ignore', 2, 2],
  });
  if (status !== 0) throw new Error('there is no build to test: `npm run build` fails');
}
