/**
 * A Node worker or port as comlink wants it. Comlink's own adapter cannot be imported by its name in
 * Node, which finds no file without an ending.
 */
import type { MessagePort, TransferListItem, Worker } from 'node:worker_threads';
import type { Endpoint } from 'comlink';

export function nodeEndpoint(port: Worker | MessagePort): Endpoint {
  const wrappers = new WeakMap<object, (data: unknown) => void>();
  return {
    postMessage: (message: unknown, transfer?: Transferable[]) =>
      port.postMessage(message, transfer as readonly TransferListItem[] | undefined),
    addEventListener: (_type, listener) => {
      const wrapper = (data: unknown): void => {
        const event = { data } as MessageEvent;
        if (typeof listener === 'function') listener(event);
        else listener.handleEvent(event);
      };
      wrappers.set(listener, wrapper);
      port.on('message', wrapper);
    },
    removeEventListener: (_type, listener) => {
      const wrapper = wrappers.get(listener);
      if (wrapper !== undefined) port.off('message', wrapper);
      wrappers.delete(listener);
    },
  };
}
