/** Sends one file over HTTP: whole or a byte range, or word that the browser's copy is still good. */
import { type FileHandle, open } from 'node:fs/promises';
import type { IncomingMessage, ServerResponse } from 'node:http';
import { pipeline } from 'node:stream/promises';
import { parseByteRange } from './byte-range';
import { mediaTypeOf } from './media-types';

export interface ServedFile {
  readonly path: string;
  readonly cacheControl: string;
}

/** Answers with the file; with "not found" where it cannot be opened or is no plain file. */
export async function sendFile(
  request: IncomingMessage,
  response: ServerResponse,
  file: ServedFile,
): Promise<void> {
  const handle = await openPlainFile(file.path);
  if (handle === null) {
    sendText(response, 404, 'Not found');
    return;
  }
  try {
    await answer(request, response, file, handle);
  } finally {
    await handle.close();
  }
}

export function sendText(response: ServerResponse, status: number, text: string): void {
  const body = Buffer.from(`${text}\n`);
  response.writeHead(status, {
    'Content-Type': 'text/plain; charset=utf-8',
    'Content-Length': body.length,
    'Cache-Control': 'no-store',
  });
  response.end(response.req.method === 'HEAD' ? undefined : body);
}

async function openPlainFile(path: string): Promise<FileHandle | null> {
  try {
    const handle = await open(path, 'r');
    if ((await handle.stat()).isFile()) return handle;
    await handle.close();
  } catch {
    // Why it cannot be opened is nothing a page should learn.
  }
  return null;
}

async function answer(
  request: IncomingMessage,
  response: ServerResponse,
  { path, cacheControl }: ServedFile,
  handle: FileHandle,
): Promise<void> {
  const { size, mtimeMs } = await handle.stat();
  const tag = `"${size.toString(36)}-${Math.round(mtimeMs).toString(36)}"`;
  response.setHeader('ETag', tag);
  response.setHeader('Cache-Control', cacheControl);
  response.setHeader('Accept-Ranges', 'bytes');
  const { range, 'if-range': ifRange, 'if-none-match': ifNoneMatch } = request.headers;
  if (ifNoneMatch?.split(/\s*,\s*/).includes(tag)) {
    response.writeHead(304).end();
    return;
  }
  // A part of a file that has changed since would not fit the parts fetched before.
  const isSameFile = ifRange === undefined || ifRange === tag;
  const asked = parseByteRange(isSameFile ? range : undefined, size);
  if (asked.kind === 'unsatisfiable') {
    response.writeHead(416, { 'Content-Range': `bytes */${size}`, 'Content-Length': 0 }).end();
    return;
  }
  const part = asked.kind === 'part' ? asked : { first: 0, last: size - 1 };
  const length = part.last - part.first + 1;
  response.writeHead(asked.kind === 'part' ? 206 : 200, {
    'Content-Type': mediaTypeOf(path),
    'Content-Length': length,
    ...(asked.kind === 'part' && { 'Content-Range': `bytes ${part.first}-${part.last}/${size}` }),
  });
  if (request.method === 'HEAD' || length === 0) {
    response.end();
    return;
  }
  const bytes = handle.createReadStream({ start: part.first, end: part.last, autoClose: false });
  try {
    await pipeline(bytes, response);
  } catch {
    // The browser went away, or the file shrank under us: the length no longer fits, so it will notice.
    response.destroy();
  }
}
