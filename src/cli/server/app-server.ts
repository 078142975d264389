/** The server behind `rimlight serve`: the built app and what it is to open, to this machine only. */
import { createServer, type IncomingMessage, type Server, type ServerResponse } from 'node:http';
import { RimlightError } from '../../errors';
import { appFileAt, cacheControlOf } from './app-files';
import { isLocalHost, securityHeaders } from './headers';
import { manifestAddress, type Offer } from './offer';
import { sendFile, sendText } from './send-file';

export interface AppServerOptions {
  /** folder of the built app */
  readonly appFolder: string;
  readonly offer: Offer;
}

/** A server that does not listen yet. */
export function createAppServer(options: AppServerOptions): Server {
  return createServer((request, response) => {
    respond(request, response, options).catch(() => {
      if (response.headersSent) response.destroy();
      else sendText(response, 500, 'Something went wrong inside the program');
    });
  });
}

async function respond(
  request: IncomingMessage,
  response: ServerResponse,
  { appFolder, offer }: AppServerOptions,
): Promise<void> {
  for (const [name, value] of Object.entries(securityHeaders)) response.setHeader(name, value);
  if (!isLocalHost(request.headers.host)) {
    sendText(response, 403, 'This server answers this machine only, as 127.0.0.1 or localhost');
    return;
  }
  if (request.method !== 'GET' && request.method !== 'HEAD') {
    response.setHeader('Allow', 'GET, HEAD');
    sendText(response, 405, 'Only GET and HEAD are answered');
    return;
  }
  const [address = ''] = (request.url ?? '').split('?', 1);
  if (address === manifestAddress) {
    sendManifest(request, response, offer);
    return;
  }
  const offered = offer.files.get(address);
  if (offered !== undefined) {
    await sendFile(request, response, { path: offered, cacheControl: 'no-store' });
    return;
  }
  const decoded = decodedAddress(address);
  const path = decoded === null ? null : await appFileAt(appFolder, decoded);
  if (decoded === null || path === null) sendText(response, 404, 'Not found');
  else await sendFile(request, response, { path, cacheControl: cacheControlOf(decoded) });
}

function sendManifest(request: IncomingMessage, response: ServerResponse, offer: Offer): void {
  const body = Buffer.from(`${JSON.stringify(offer.manifest, null, 2)}\n`);
  response.writeHead(200, {
    'Content-Type': 'application/json; charset=utf-8',
    'Content-Length': body.length,
    'Cache-Control': 'no-store',
  });
  response.end(request.method === 'HEAD' ? undefined : body);
}

function decodedAddress(address: string): string | null {
  try {
    return decodeURIComponent(address);
  } catch {
    return null;
  }
}

/** The first port tried when none is asked for, and how many after it. */
export const usualPort = 4310;
const portsTried = 50;

/**
 * Listens on loopback.
 *
 * @param port - 0 takes any free one; null the usual one, or the next free one after it
 * @returns the port listened on
 * @throws RimlightError 'usage' - when the port asked for is taken or not allowed
 */
export async function listenOnLoopback(server: Server, port: number | null): Promise<number> {
  const last = port ?? usualPort + portsTried - 1;
  for (let tried = port ?? usualPort; ; tried++) {
    try {
      return await listen(server, tried);
    } catch (error) {
      const { code } = error as NodeJS.ErrnoException;
      if (code !== 'EADDRINUSE' && code !== 'EACCES') throw error;
      if (tried >= last) throw portRefused(port, code);
    }
  }
}

function listen(server: Server, port: number): Promise<number> {
  return new Promise((resolve, reject) => {
    server.once('error', reject);
    server.listen({ port, host: '127.0.0.1', exclusive: true }, () => {
      server.off('error', reject);
      const address = server.address();
      resolve(typeof address === 'object' && address !== null ? address.port : port);
    });
  });
}

function portRefused(port: number | null, code: string): RimlightError {
  if (port === null) {
    return new RimlightError('usage', {
      what: `the ports ${usualPort} to ${usualPort + portsTried - 1} are all taken`,
      where: '127.0.0.1',
      hint: 'Give a free one with --port.',
    });
  }
  return new RimlightError('usage', {
    what: `port ${port} ${code === 'EACCES' ? 'may not be used' : 'is taken'}`,
    where: '127.0.0.1',
    hint: 'Give another one with --port, or leave it out.',
  });
}
