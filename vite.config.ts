/// <reference types="vitest/config" />
import { fileURLToPath } from 'node:url';
import react from '@vitejs/plugin-react';
import { defineConfig } from 'vite';

const fromRoot = (path: string): string => fileURLToPath(new URL(path, import.meta.url));

/** Headers of every page served: cross-origin isolation, and nothing from outside (the built app gets a stricter policy from `rimlight serve`). */
const isolation = {
  'Cross-Origin-Opener-Policy': 'same-origin',
  'Cross-Origin-Embedder-Policy': 'require-corp',
};

/** `--mode cli` builds the command line and its worker for Node, `--mode bench` the measurements; otherwise the app. */
export default defineConfig(({ mode }) => {
  if (mode === 'cli' || mode === 'bench') {
    return {
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
          output: { entryFileNames: '[name].js', chunkFileNames: 'chunks/[name]-[hash].js' },
        },
      },
    };
  }
  return {
    plugins: [react()],
    base: './',
    worker: { format: 'es' as const },
    server: { headers: isolation },
    build: { outDir: 'dist/app', target: 'es2022', emptyOutDir: true },
    test: {
      include: ['test/**/*.test.ts', 'test/**/*.test.tsx'],
      exclude: ['test/browser/**', 'node_modules/**'],
      environment: 'node',
      testTimeout: 60_000,
    },
  };
});
