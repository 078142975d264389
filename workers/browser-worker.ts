/** Entry of the Web Worker: one engine on the worker's own port. */
import { createEngineCore } from './engine-core';
import { portableSource } from './portable-source';
import { serveEngine } from './wire-engine';

serveEngine(createEngineCore(portableSource));
