import { mkdir, mkdtemp, rm, symlink, writeFile } from 'node:fs/promises';
import { type IncomingHttpHeaders, request, type Server } from 'node:http';
import { connect } from 'node:net';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { createAppServer, listenOnLoopback } from '../../../src/cli/server/app-server';
import { type Offer, offerScan } from '../../../src/cli/server/offer';

interface Answer {
  readonly status: number;
  readonly headers: IncomingHttpHeaders;
  readonly body: Buffer;
}

let folder = '';
let server: Server;
let port = 0;

beforeAll(async () => {
  folder = await mkdtemp(join(tmpdir(), 'rimlight-server-'));
  const app = join(folder, 'app');
  await mkdir(join(app, 'assets'), { recursive: true });
  await mkdir(join(app, 'sample-data'));
  await writeFile(join(app, 'index.html'), '<!doctype html><title>µ</title>');
  await writeFile(join(app, 'assets', 'index-3f2a.js'), 'export const a = 1;');
  await writeFile(join(app, 'assets', 'kernel-77.wasm'), Buffer.from([0, 0x61, 0x73, 0x6d]));
  await writeFile(join(app, 'sample-data', 'tent-field.h5'), 'h5');
  await writeFile(join(app, '.secret'), 'hidden');
  await writeFile(join(folder, 'outside.txt'), 'outside');
  await symlink(join(folder, 'outside.txt'), join(app, 'link.txt'));
  await writeFile(join(folder, 'my scan#1.h5'), Buffer.from('0123456789'));
  await writeFile(join(folder, 'empty.npy'), '');
  server = createAppServer({ appFolder: app, offer: scanOffer() });
  port = await listenOnLoopback(server, 0);
});

afterAll(async () => {
  server.close();
  await rm(folder, { recursive: true });
});

function scanOffer(): Offer {
  const path = join(folder, 'my scan#1.h5');
  const empty = join(folder, 'empty.npy');
  return offerScan({ name: 'my scan#1.h5', path, size: 10 }, null, [
    { name: 'empty.npy', path: empty, size: 0 },
  ]);
}

function ask(
  path: string,
  { method = 'GET', headers = {} }: { method?: string; headers?: Record<string, string> } = {},
): Promise<Answer> {
  return new Promise((resolve, reject) => {
    const asking = request({ host: '127.0.0.1', port, path, method, headers }, (response) => {
      const parts: Buffer[] = [];
      response.on('data', (part: Buffer) => parts.push(part));
      response.on('end', () =>
        resolve({
          status: response.statusCode ?? 0,
          headers: response.headers,
          body: Buffer.concat(parts),
        }),
      );
    });
    asking.on('error', reject);
    asking.end();
  });
}

describe('headers', () => {
  it.each(['/', '/assets/index-3f2a.js', '/open/manifest.json', '/nothing-there'])(
    'isolate %s and let nothing in from outside',
    async (path) => {
      const { headers } = await ask(path);
      expect(headers).toMatchObject({
        'cross-origin-opener-policy': 'same-origin',
        'cross-origin-embedder-policy': 'require-corp',
        'cross-origin-resource-policy': 'same-origin',
        'x-content-type-options': 'nosniff',
        'referrer-policy': 'no-referrer',
      });
      const policy = String(headers['content-security-policy']).split('; ');
      expect(policy).toContain("default-src 'self'");
      expect(policy).toContain("script-src 'self' 'wasm-unsafe-eval'");
      expect(policy).toContain("connect-src 'self'");
      expect(policy).toContain("frame-ancestors 'none'");
      expect(policy.join()).not.toMatch(/unsafe-inline|'unsafe-eval'|https?:|\*/);
    },
  );

  // WHATWG HTML 4.12.1 (scripts) and the WebAssembly Web API 3 (wasm) refuse other types.
  it.each([
    ['/', 'text/html; charset=utf-8'],
    ['/assets/index-3f2a.js', 'text/javascript; charset=utf-8'],
    ['/assets/kernel-77.wasm', 'application/wasm'],
    ['/sample-data/tent-field.h5', 'application/x-hdf5'],
    ['/open/manifest.json', 'application/json; charset=utf-8'],
  ])('give %s the type %s', async (path, type) => {
    expect((await ask(path)).headers['content-type']).toBe(type);
  });

  it('let hashed files be kept, ask anew for the page, and never keep the user’s own', async () => {
    expect((await ask('/assets/index-3f2a.js')).headers['cache-control']).toContain('immutable');
    expect((await ask('/')).headers['cache-control']).toBe('no-cache');
    expect((await ask('/open/scan/my%20scan%231.h5')).headers['cache-control']).toBe('no-store');
  });

  it('answer 304 to a browser that has the file already', async () => {
    const { headers } = await ask('/');
    const again = await ask('/', { headers: { 'if-none-match': String(headers.etag) } });
    expect(again.status).toBe(304);
    expect(again.body).toHaveLength(0);
  });
});

describe('who may ask', () => {
  it.each(['127.0.0.1:4310', 'localhost', 'LOCALHOST:80', '[::1]:4310'])(
    'answers the host %s',
    async (host) => {
      expect((await ask('/', { headers: { host } })).status).toBe(200);
    },
  );

  it.each([
    'example.org',
    'localhost.example.org',
    '127.0.0.1.example.org:4310',
    '10.0.0.5',
    'a@localhost',
  ])('refuses the host %s, which only another site would send', async (host) => {
    const { status, body } = await ask('/open/scan/my%20scan%231.h5', { headers: { host } });
    expect(status).toBe(403);
    expect(body.toString()).not.toContain('0123');
  });

  it('refuses everything but reading', async () => {
    for (const method of ['POST', 'PUT', 'DELETE', 'OPTIONS']) {
      const { status, headers } = await ask('/', { method });
      expect(status).toBe(405);
      expect(headers.allow).toBe('GET, HEAD');
    }
  });

  it('answers HEAD with the length and no body', async () => {
    const { status, headers, body } = await ask('/open/scan/my%20scan%231.h5', { method: 'HEAD' });
    expect([status, headers['content-length'], body.length]).toEqual([200, '10', 0]);
  });
});

describe('what can be reached', () => {
  it.each([
    '/../outside.txt',
    '/%2e%2e/outside.txt',
    '/assets/../../outside.txt',
    '/assets/..%2f..%2foutside.txt',
    '/..%5coutside.txt',
    '/link.txt',
    '/.secret',
    '/assets',
    '/assets/',
    '//outside.txt',
    '/index.html%00.js',
    '/%ff',
    '/open/scan/../../outside.txt',
    '/open/scan/',
    '/open/',
  ])('is not %s', async (path) => {
    const { status, body } = await ask(path);
    expect(status).toBe(404);
    expect(body.toString()).not.toMatch(/outside|hidden/);
  });

  it('is not a path without its slash, as no browser sends it', async () => {
    const answer = await new Promise<string>((resolve) => {
      const socket = connect(port, '127.0.0.1', () => {
        socket.write('GET ../outside.txt HTTP/1.1\r\nHost: localhost\r\nConnection: close\r\n\r\n');
      });
      let text = '';
      socket.on('data', (part) => {
        text += part.toString();
      });
      socket.on('end', () => resolve(text));
    });
    expect(answer).toMatch(/^HTTP\/1\.1 40[04]/);
    expect(answer).not.toContain('outside');
  });
});

describe('the offered scan', () => {
  it('is described by the manifest', async () => {
    expect(JSON.parse((await ask('/open/manifest.json')).body.toString())).toEqual({
      scan: { name: 'my scan#1.h5', url: '/open/scan/my%20scan%231.h5', size: 10 },
      recipe: null,
      companions: [{ name: 'empty.npy', url: '/open/companions/empty.npy', size: 0 }],
    });
  });

  it('is sent whole, or the bytes asked for', async () => {
    const url = '/open/scan/my%20scan%231.h5';
    const whole = await ask(url);
    expect([whole.status, whole.body.toString()]).toEqual([200, '0123456789']);
    const part = await ask(url, { headers: { range: 'bytes=2-4' } });
    expect([part.status, part.body.toString()]).toEqual([206, '234']);
    expect(part.headers['content-range']).toBe('bytes 2-4/10');
    const first = await ask(url, { headers: { range: 'bytes=0-0' } });
    expect([first.status, first.body.toString()]).toEqual([206, '0']);
    const beyond = await ask(url, { headers: { range: 'bytes=10-' } });
    expect([beyond.status, beyond.headers['content-range']]).toEqual([416, 'bytes */10']);
  });

  it('is sent whole when it changed since the first part', async () => {
    const url = '/open/scan/my%20scan%231.h5';
    const { headers } = await ask(url);
    const range = 'bytes=2-4';
    const same = await ask(url, { headers: { range, 'if-range': String(headers.etag) } });
    const changed = await ask(url, { headers: { range, 'if-range': '"other"' } });
    expect([same.status, changed.status]).toEqual([206, 200]);
  });

  it('may be empty', async () => {
    const { status, body } = await ask('/open/companions/empty.npy');
    expect([status, body.length]).toEqual([200, 0]);
  });

  it('is not found any more when it is deleted, and the server lives on', async () => {
    const path = join(folder, 'gone.h5');
    await writeFile(path, 'x');
    const other = createAppServer({
      appFolder: join(folder, 'app'),
      offer: offerScan({ name: 'gone.h5', path, size: 1 }, null, []),
    });
    const usual = port;
    port = await listenOnLoopback(other, 0);
    await rm(path);
    expect((await ask('/open/scan/gone.h5')).status).toBe(404);
    expect((await ask('/')).status).toBe(200);
    port = usual;
    other.close();
  });
});

describe('listenOnLoopback', () => {
  it('takes the next free port when the usual one is taken', async () => {
    const options = { appFolder: folder, offer: scanOffer() };
    const [one, other] = [createAppServer(options), createAppServer(options)];
    const first = await listenOnLoopback(one, null);
    const second = await listenOnLoopback(other, null);
    expect(first).toBeGreaterThanOrEqual(4310);
    expect(second).toBeGreaterThan(first);
    one.close();
    other.close();
  });

  it('says so when the very port asked for is taken', async () => {
    const another = createAppServer({ appFolder: folder, offer: scanOffer() });
    await expect(listenOnLoopback(another, port)).rejects.toMatchObject({
      kind: 'usage',
      what: `port ${port} is taken`,
    });
  });

  it('listens to this machine only', () => {
    expect(server.address()).toMatchObject({ address: '127.0.0.1' });
  });
});
