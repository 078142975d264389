/** Text files for tests, opened from memory. */
import { memorySource } from '../../../src/io/byte-source';
import type { ArrayEntry, Container } from '../../../src/io/container';
import { textReader } from '../../../src/io/text/text-reader';
import type { CountsArray } from '../../../src/science/scan';

export function bytesOf(text: string): Uint8Array {
  return new TextEncoder().encode(text);
}

/** @param text - the file's text, or its lines */
export function openText(text: string | readonly string[], name = 'table.csv'): Promise<Container> {
  const whole = typeof text === 'string' ? text : `${text.join('\n')}\n`;
  return textReader.open(memorySource(name, bytesOf(whole)));
}

export function entryOf(container: Container, path: string): ArrayEntry {
  const entry = container.entries.find((one) => one.path === path);
  if (entry === undefined) {
    throw new Error(`no ${path} among ${container.entries.map((one) => one.path).join(', ')}`);
  }
  return entry;
}

/** The whole of an array. */
export function readAll(container: Container, path: string): Promise<CountsArray> {
  const { shape } = entryOf(container, path);
  return container.read(
    path,
    shape.map(() => 0),
    shape,
  );
}

export async function numbersOf(container: Container, path: string): Promise<number[]> {
  return Array.from(await readAll(container, path));
}

/** "counts 2 × 3 × 4 uint8", for each array. */
export function shapesOf({ entries }: Container): string[] {
  return entries.map(({ path, shape, type }) => `${path} ${shape.join(' × ')} ${type}`);
}
