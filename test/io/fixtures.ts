/** Committed files of test/fixtures/io and what Python read from them (make-binary.py). */
import { readdirSync, readFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import { memorySource } from '../../src/io/byte-source';
import type { ArrayEntry, Container, Reader } from '../../src/io/container';

const folder = fileURLToPath(new URL('../fixtures/io/', import.meta.url));

/** Numbers as JSON can hold them: NaN, infinities and −0 are texts. */
export type PlainNumber = number | 'NaN' | 'Infinity' | '-Infinity' | '-0';

export interface ExpectedArray {
  readonly shape: readonly number[];
  readonly type: string;
  readonly values: readonly PlainNumber[];
  readonly attributes?: ArrayEntry['attributes'];
}

/** @param path - within test/fixtures/io: "npy/u2-le-c.npy" */
export function fixtureBytes(path: string): Uint8Array {
  return new Uint8Array(readFileSync(`${folder}${path}`));
}

/** Names of the files in a folder of fixtures, without ending. */
export function fixtureNames(name: string): readonly string[] {
  return readdirSync(`${folder}${name}`).map((file) => file.replace(/\.[^.]+$/, ''));
}

export function expectedOf<T>(name: string): Readonly<Record<string, T>> {
  return JSON.parse(readFileSync(`${folder}${name}.expected.json`, 'utf8'));
}

export function numbersOf(values: readonly PlainNumber[]): readonly number[] {
  return values.map(Number);
}

export function openFixture(reader: Reader, path: string): Promise<Container> {
  return reader.open(memorySource(path.split('/').at(-1) ?? path, fixtureBytes(path)));
}
