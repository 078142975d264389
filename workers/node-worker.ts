/** Entry of the worker thread: one engine on the port to its parent. Opens files by path. */
import { parentPort } from 'node:worker_threads';
import { pathSource } from '../src/io/node-source';
import { createEngineCore } from './engine-core';
import { nodeEndpoint } from './node-endpoint';
import { portableSource } from './portable-source';
import { serveEngine } from './wire-engine';

const core = createEngineCore((handle) =>
  handle.kind === 'path' ? pathSource(handle.path) : portableSource(handle),
);
if (parentPort !== null) serveEngine(core, nodeEndpoint(parentPort));
