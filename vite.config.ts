/// <reference types="vitest/config" />
import { existsSync, mkdirSync, readdirSync, readFileSync, statSync, writeFileSync } from 'node:fs';
import { resolve as resolvePath } from 'node:path';
import { fileURLToPath } from 'node:url';
import react from '@vitejs/plugin-react';
import { defineConfig, type Plugin, runnerImport } from 'vite';

const fromRoot = (path: string): string => fileURLToPath(new URL(path, import.meta.url));

/** Headers of every page served: cross-origin isolation, and nothing from outside (the built app gets a stricter policy from `rimlight serve`). */
const isolation = {
  'Cross-Origin-Opener-Policy': 'same-origin',
  'Cross-Origin-Embedder-Policy': 'require-corp',
};

/** A module of ours, compiled on the way: this file itself may import packages only. */
async function importSource<T>(path: string): Promise<T> {
  const { module } = await runnerImport<T>(fromRoot(path), { configFile: false, logLevel: 'warn' });
  return module;
}

/** Writes the recipe's JSON Schema into public/ before it is served or copied; the schema is code, the file is not kept. */
function recipeSchemaFile(): Plugin {
  return {
    name: 'recipe-schema-file',
    apply: (_, { command }) => command === 'build' || process.env.VITEST === undefined,
    async buildStart() {
      const { recipeJsonSchema } = await importSource<typeof import('./src/recipe/json-schema')>(
        'src/recipe/json-schema.ts',
      );
      mkdirSync(fromRoot('public'), { recursive: true });
      const text = `${JSON.stringify(recipeJsonSchema(), null, 2)}\n`;
      writeFileSync(fromRoot('public/recipe.schema.json'), text);
    },
  };
}

/**
 * The HDF5 library's WebAssembly alone, so that a damaged file that breaks one instance can be followed by a
 * fresh one; the package exports only a single instance made for good. The same build serves Node.
 */
const resolve = {
  alias: { 'h5wasm/factory': fromRoot('node_modules/h5wasm/dist/esm/hdf5_util.js') },
};

/**
 * The fit's kernel, compiled from AssemblyScript when it is first asked for; as text inside the program, since a worker may
 * fetch nothing while it starts.
 */
function fitKernel(): Plugin {
  const name = './assembly/shapes?compiled';
  const own = '\0fit-kernel';
  const folder = fromRoot('workers/kernel/assembly');
  return {
    name: 'fit-kernel',
    enforce: 'pre',
    resolveId: (id) => (id === name ? own : null),
    async load(id) {
      if (id !== own) return null;
      for (const file of readdirSync(folder)) this.addWatchFile(resolvePath(folder, file));
      const { main } = await import('assemblyscript/asc');
      let binary: Uint8Array | null = null;
      const { error, stderr } = await main(
        ['--config', fromRoot('asconfig.json'), '--outFile', 'fit-kernel.wasm'],
        {
          readFile: (path, base) => {
            const file = resolvePath(base, path);
            return existsSync(file) ? readFileSync(file, 'utf8') : null;
          },
          writeFile: (_, content) => {
            if (typeof content !== 'string') binary = content;
          },
        },
      );
      if (error !== null || binary === null) throw new Error(`the fit's kernel: ${stderr}`);
      return `export const encodedKernel = '${Buffer.from(binary).toString('base64')}';`;
    },
  };
}

/** What the page of `npm run dev` opens at once, as `rimlight serve` tells it. */
function demoOffer(): Plugin {
  return {
    name: 'demo-offer',
    apply: 'serve',
    async configureServer({ middlewares }) {
      const { manifestAddress, offerDemo } =
        await importSource<typeof import('./src/cli/server/offer')>('src/cli/server/offer.ts');
      middlewares.use(manifestAddress, async (_request, response) => {
        const { manifest } = await offerDemo(async (address) => {
          const path = fromRoot(address.slice(1));
          return existsSync(path) ? statSync(path).size : null;
        });
        response.setHeader('Content-Type', 'application/json; charset=utf-8');
        response.end(JSON.stringify(manifest));
      });
    },
  };
}

/** `--mode cli` builds the command line and its worker for Node, `--mode bench` the measurements; otherwise the app. */
export default defineConfig(({ mode }) => {
  if (mode === 'cli' || mode === 'bench') {
    return {
      resolve,
      plugins: [fitKernel()],
      publicDir: false,
      build: {
        ssr: true,
        target: 'node20',
        outDir: `dist/${mode}`,
        emptyOutDir: true,
        rollupOptions: {
          input: {
            ...(mode === 'cli'
              ? { rimlight: fromRoot('src/cli/rimlight.ts') }
              : { bench: fromRoot('test/bench/bench.ts') }),
            'node-worker': fromRoot('workers/node-worker.ts'),
          },
          output: { entryFileNames: '[name].js', chunkFileNames: '[name]-[hash].js' },
        },
      },
    };
  }
  return {
    resolve,
    // The plotting library speaks of Node's name for the global object.
    define: { global: 'globalThis' },
    plugins: [react(), fitKernel(), recipeSchemaFile(), demoOffer()],
    base: './',
    worker: { format: 'es' as const, plugins: () => [fitKernel()] },
    server: { headers: isolation },
    build: {
      outDir: 'dist/app',
      target: 'es2022',
      emptyOutDir: true,
      // The HDF5 library is one piece of 4.7 MB, fetched by workers when an HDF5 file is met.
      chunkSizeWarningLimit: 5000,
    },
    test: {
      environment: 'node',
      testTimeout: 60_000,
      projects: [
        {
          extends: true,
          test: {
            name: 'unit',
            include: ['test/**/*.test.ts', 'test/**/*.test.tsx'],
            exclude: ['test/browser/**', 'test/cli/program/**', 'node_modules/**'],
          },
        },
        {
          extends: true,
          // These run the built program, so there must be one; it is built where sources are newer.
          test: {
            name: 'program',
            include: ['test/cli/program/**/*.test.ts'],
            globalSetup: ['test/cli/program/ensure-built.ts'],
          },
        },
      ],
    },
  };
});
