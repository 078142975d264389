/** Media types of the files that are served, by their ending. */
import { extname } from 'node:path';

const types: Readonly<Record<string, string>> = {
  '.html': 'text/html; charset=utf-8',
  '.js': 'text/javascript; charset=utf-8',
  '.mjs': 'text/javascript; charset=utf-8',
  '.css': 'text/css; charset=utf-8',
  '.json': 'application/json; charset=utf-8',
  '.txt': 'text/plain; charset=utf-8',
  '.csv': 'text/csv; charset=utf-8',
  '.svg': 'image/svg+xml; charset=utf-8',
  '.png': 'image/png',
  '.woff': 'font/woff',
  '.woff2': 'font/woff2',
  '.wasm': 'application/wasm',
  '.h5': 'application/x-hdf5',
};

/** What is not known is bytes; with `nosniff` a browser takes it for nothing else. */
export function mediaTypeOf(path: string): string {
  return types[extname(path).toLowerCase()] ?? 'application/octet-stream';
}
