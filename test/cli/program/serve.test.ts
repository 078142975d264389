import type { ChildProcess } from 'node:child_process';
import { readFile } from 'node:fs/promises';
import { createServer } from 'node:net';
import { afterEach, describe, expect, it } from 'vitest';
import { demoRecipe, demoScan, outcomeOf, rimlight, start } from './program';

const running: ChildProcess[] = [];
afterEach(() => {
  for (const child of running.splice(0)) child.kill('SIGKILL');
});

/** Starts the server and waits for its address. */
async function serve(...words: readonly string[]) {
  const child = start(['serve', ...words]);
  running.push(child);
  const ended = outcomeOf(child);
  const said = await new Promise<string>((resolve) => {
    child.stdout?.once('data', (text) => resolve(String(text)));
    child.once('close', () => resolve(''));
  });
  return { child, ended, said, address: /http:\/\/[\d.:]+\//.exec(said)?.[0] ?? '' };
}

describe('rimlight serve', () => {
  it('prints its address on one line, serves the app with the demo scan, and ends cleanly', async () => {
    const { child, ended, said, address } = await serve('--port', '0');
    expect(said).toMatch(/^Rimlight is at http:\/\/127\.0\.0\.1:\d+\/ \(Ctrl-C ends it\)\n$/);
    const page = await fetch(address);
    expect(page.headers.get('content-security-policy')).toContain("default-src 'self'");
    const html = await page.text();
    expect(html).toContain('<div id="root">');
    // Our own policy forbids inline scripts, so the built page may have none.
    expect(html).not.toMatch(/<script(?![^>]*\ssrc=)[^>]*>/);
    const manifest = await (await fetch(`${address}open/manifest.json`)).json();
    expect(manifest.scan).toMatchObject({
      name: 'tent-field.h5',
      url: '/sample-data/tent-field.h5',
    });
    expect(manifest.recipe).toMatchObject({ url: '/sample-data/tent-field.recipe.json' });
    const scan = await fetch(new URL(manifest.scan.url, address));
    expect(Buffer.compare(Buffer.from(await scan.arrayBuffer()), await readFile(demoScan))).toBe(0);
    child.kill('SIGINT');
    expect(await ended).toEqual({ code: 0, out: said, err: '' });
  });

  it('offers the scan it is given, with its recipe', async () => {
    const { address } = await serve(demoScan, '--recipe', demoRecipe, '--port', '0');
    const manifest = await (await fetch(`${address}open/manifest.json`)).json();
    expect(manifest).toEqual({
      scan: {
        name: 'tent-field.h5',
        url: '/open/scan/tent-field.h5',
        size: (await readFile(demoScan)).length,
      },
      recipe: {
        name: 'tent-field.recipe.json',
        url: '/open/recipe/tent-field.recipe.json',
        size: (await readFile(demoRecipe)).length,
      },
      companions: [],
    });
    const part = await fetch(new URL(manifest.scan.url, address), {
      headers: { range: 'bytes=1-3' },
    });
    expect([part.status, await part.text()]).toEqual([206, 'HDF']);
  });

  it('refuses a port that is taken, a scan that is not there, a recipe that is wrong', async () => {
    const holder = createServer();
    const port = await new Promise<number>((resolve) => {
      holder.listen(0, '127.0.0.1', () => {
        const address = holder.address();
        resolve(typeof address === 'object' && address !== null ? address.port : 0);
      });
    });
    const taken = await rimlight('serve', '--port', String(port));
    expect(taken.code).toBe(2);
    expect(taken.err).toBe(
      `rimlight: port ${port} is taken (127.0.0.1). Give another one with --port, or leave it out.\n`,
    );
    holder.close();
    expect((await rimlight('serve', 'nowhere.h5')).code).toBe(3);
    expect((await rimlight('serve', demoScan, '--recipe', demoScan)).code).toBe(2);
  });
});
