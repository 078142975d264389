/** What NeXus attributes say: which array is the default signal, and what its axes are called. */
import type { ArrayEntry, AttributeValue, Container, GroupEntry } from '../container';
import { folderOf, nameOf, textAttribute } from './words';

export interface NexusSignal {
  readonly entry: ArrayEntry;
  /** the NXdata group */
  readonly group: string;
  /** one name per axis of the signal, "." where it has none; null when the file does not say */
  readonly axes: readonly string[] | null;
  readonly evidence: string;
}

/**
 * The signal of the file's NXdata groups, the one on the chain of `default` attributes first. A
 * dataset marked `signal = 1`, the older way, counts too.
 *
 * @see NeXus manual, NXdata: attributes signal, axes, default
 */
export function findNexusSignal(container: Container): NexusSignal | null {
  const signals = container.groups.flatMap((group) => signalOf(container, group));
  const onChain = defaultChain(container);
  const first = signals.find(({ group }) => onChain.includes(group)) ?? signals[0];
  if (first !== undefined) return first;
  const marked = container.entries.find(
    (entry) => textAttribute(entry.attributes, 'signal') === '1' && entry.shape.length > 0,
  );
  if (marked === undefined) return null;
  return {
    entry: marked,
    group: folderOf(marked.path),
    axes: axesOf(marked.attributes),
    evidence: `marked as the signal (signal = 1)`,
  };
}

function signalOf(container: Container, group: GroupEntry): NexusSignal[] {
  const name = textAttribute(group.attributes, 'signal');
  if (name === null) return [];
  const entry = container.entries.find(({ path }) => path === joined(group.path, name));
  if (entry === undefined) return [];
  return [
    {
      entry,
      group: group.path,
      axes: axesOf(group.attributes) ?? axesOf(entry.attributes),
      evidence: `the signal of the NXdata group ${group.path === '' ? '/' : group.path}`,
    },
  ];
}

/** Groups named by `default` attributes from the root downwards. */
function defaultChain(container: Container): readonly string[] {
  const chain: string[] = [];
  let at = container.groups.find(({ path }) => path === '/' || path === '');
  while (at !== undefined && chain.length < 16) {
    const next = textAttribute(at.attributes, 'default');
    if (next === null) break;
    const path = joined(at.path, next);
    if (chain.includes(path)) break;
    chain.push(path);
    at = container.groups.find((group) => group.path === path);
  }
  return chain;
}

function joined(folder: string, name: string): string {
  if (name.startsWith('/')) return name;
  return folder === '/' || folder === '' ? `/${name}` : `${folder}/${name}`;
}

/** A list of names, or the older text "y:x:energy" (or with commas, with or without square brackets). */
function axesOf(attributes: Readonly<Record<string, AttributeValue>>): readonly string[] | null {
  const value = Object.entries(attributes).find(([key]) => key.toLowerCase() === 'axes')?.[1];
  if (value === undefined || typeof value === 'number') return null;
  if (typeof value === 'string') {
    const names = value.replace(/[[\]]/g, '').split(/[:,]/);
    return names.map((name) => name.trim());
  }
  return value.map((name) => nameOf(String(name)));
}
