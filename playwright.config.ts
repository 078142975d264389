/** Browser tests: the built app, served as users get it, in the Chromium of this machine. */
import { defineConfig } from '@playwright/test';

const port = 41_873;
const address = `http://127.0.0.1:${port}/`;

export default defineConfig({
  testDir: 'test/browser',
  testMatch: '*.spec.ts',
  // One at a time: the tests measure how long things take, and each fills the engine's workers.
  workers: 1,
  fullyParallel: false,
  retries: 0,
  forbidOnly: true,
  timeout: 60_000,
  // What is waited for comes in its time, also on a machine with other work to do.
  expect: { timeout: 15_000 },
  outputDir: 'test-results',
  use: {
    baseURL: address,
    viewport: { width: 1440, height: 900 },
    // A trace of every test would cost a quarter of the time; `--trace on` makes one when it is wanted.
    screenshot: 'only-on-failure',
    launchOptions: {
      executablePath: process.env.CHROMIUM_PATH ?? '/usr/bin/chromium',
      args: [
        // Tests may run as root in a container, where the sandbox cannot start.
        '--no-sandbox',
        '--disable-gpu',
        '--disable-quic',
        '--no-first-run',
        '--disable-background-networking',
        '--disable-component-update',
        '--disable-sync',
      ],
    },
  },
  webServer: {
    command: `node dist/cli/rimlight.js serve --port ${port}`,
    url: address,
    reuseExistingServer: false,
    gracefulShutdown: { signal: 'SIGTERM', timeout: 5_000 },
  },
});
