import { fileURLToPath } from 'node:url';
import { expect, test } from '@playwright/test';
import { build } from 'vite';
import { elementaryBitsDigest, pinnedElementaryBits } from '../science/numeric/elementary-bits';
import { type DemoDigests, demoDigests } from './demo-digests';

/** A module of ours as one script, for the page to run. */
async function bundle(path: string): Promise<string> {
  const result = await build({
    configFile: false,
    logLevel: 'error',
    build: {
      write: false,
      minify: false,
      lib: {
        entry: fileURLToPath(new URL(path, import.meta.url)),
        formats: ['es'],
        fileName: 'bits',
      },
    },
  });
  const [output] = Array.isArray(result) ? result : [result];
  if (output === undefined || !('output' in output)) throw new Error('nothing was bundled');
  return output.output[0].code;
}

test('elementary functions and demo scans have the same bits here as in Node', async ({ page }) => {
  const script = await bundle('./demo-digests.ts');
  await page.route('**/bits.js', (route) =>
    route.fulfill({ contentType: 'text/javascript', body: script }),
  );
  await page.goto('/');
  const inPage = await page.evaluate(async (): Promise<DemoDigests> => {
    const address = '/bits.js';
    const module = await import(/* @vite-ignore */ address);
    return module.demoDigests();
  });
  expect(elementaryBitsDigest()).toBe(pinnedElementaryBits);
  expect(inPage.elementary).toBe(pinnedElementaryBits);
  expect(inPage).toEqual(demoDigests());
});
