/** The worker for Node as the build makes it, in a folder of its own inside node_modules, where its packages are found. */
import { mkdirSync, mkdtempSync, rmSync } from 'node:fs';
import { join } from 'node:path';
import { fileURLToPath, pathToFileURL } from 'node:url';
import { build, loadConfigFromFile } from 'vite';

const root = fileURLToPath(new URL('../..', import.meta.url));

export interface BuiltWorker {
  readonly file: URL;
  remove(): void;
}

/** Builds by the project's own settings for the command line, but the worker only: under a second. */
export async function buildWorker(): Promise<BuiltWorker> {
  const loaded = await loadConfigFromFile({ command: 'build', mode: 'cli' }, undefined, root);
  const config = loaded?.config ?? {};
  const cache = join(root, 'node_modules', '.cache');
  mkdirSync(cache, { recursive: true });
  const outDir = mkdtempSync(join(cache, 'rimlight-worker-'));
  await build({
    ...config,
    configFile: false,
    root,
    mode: 'cli',
    logLevel: 'error',
    build: {
      ...config.build,
      outDir,
      rollupOptions: {
        ...config.build?.rollupOptions,
        input: { 'node-worker': join(root, 'workers', 'node-worker.ts') },
      },
    },
  });
  return {
    file: pathToFileURL(join(outDir, 'node-worker.js')),
    remove: () => rmSync(outDir, { recursive: true, force: true }),
  };
}
