/** Opening the files of a call, and closing them again whatever happens. */
import { isRimlightError, RimlightError, throwIfAborted } from '../src/errors';
import type { ByteSource, Container } from '../src/io/container';
import { openContainer } from '../src/io/open-scan';
import type { Companion } from '../src/io/scan-plan';
import type { ScanInputs, SourceHandle } from './engine';
import { nextTurn } from './turn';

/** From what crosses the worker boundary to bytes: files by path in Node, Blobs, memory. */
export type ToByteSource = (handle: SourceHandle) => Promise<ByteSource>;

/** Runs `use` on the opened file. Its reads let waiting messages through first, so that a long call can be stopped. */
export async function withContainer<T>(
  toByteSource: ToByteSource,
  handle: SourceHandle,
  signal: AbortSignal,
  use: (container: Container) => Promise<T>,
): Promise<T> {
  const container = await openContainer(await toByteSource(handle), { signal });
  try {
    return await use(stoppable(container, signal, handle.name));
  } finally {
    container.close();
  }
}

function stoppable(container: Container, signal: AbortSignal, name: string): Container {
  const { format, entries, groups, facts, notes } = container;
  return {
    format,
    entries,
    groups,
    facts,
    notes,
    read: async (path, start, count, options) => {
      await nextTurn();
      throwIfAborted(signal, `reading ${name}`);
      return container.read(path, start, count, options);
    },
    close: () => container.close(),
  };
}

/** The files beside the scan that can be opened, and a sentence for each that cannot. */
export interface OpenCompanions {
  readonly companions: readonly Companion[];
  readonly warnings: readonly string[];
}

/** Runs `use` on the files given beside the scan; one that cannot be opened is left out. */
export async function withCompanions<T>(
  toByteSource: ToByteSource,
  handles: readonly SourceHandle[],
  signal: AbortSignal,
  use: (opened: OpenCompanions) => Promise<T>,
): Promise<T> {
  const companions: Companion[] = [];
  const warnings: string[] = [];
  try {
    for (const handle of handles) {
      throwIfAborted(signal, `opening ${handle.name}`);
      try {
        const container = await openContainer(await toByteSource(handle), { signal });
        companions.push({ name: handle.name, container });
      } catch (error) {
        if (!isRimlightError(error) || error.kind !== 'scan') throw error;
        warnings.push(`${handle.name} is left out: ${error.what}.`);
      }
    }
    return await use({ companions, warnings });
  } finally {
    for (const { container } of companions) container.close();
  }
}

/**
 * The file of a call's inputs by its name.
 *
 * @throws RimlightError 'usage' - when no such file was given
 */
export function companionNamed({ companions }: ScanInputs, name: string): SourceHandle {
  const found = companions.find((handle) => handle.name === name);
  if (found !== undefined) return found;
  throw new RimlightError('usage', {
    what: `the file ${name}, which belongs to the scan, was not given`,
    where: '',
    hint: 'Open it together with the scan.',
  });
}
