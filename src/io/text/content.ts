/** The arrays a text file is presented as. */
import type { CountsArray } from '../../science/scan';
import type { ArrayEntry, AttributeValue, ElementType, ReadOptions } from '../container';
import { cutBlock } from './cut-block';
import type { GrowingColumn } from './value-range';

export interface StoredEntry {
  readonly entry: ArrayEntry;
  /** A block that was checked to lie inside. */
  read(
    start: readonly number[],
    count: readonly number[],
    options: ReadOptions,
  ): Promise<CountsArray>;
}

export interface Content {
  readonly arrays: readonly StoredEntry[];
  readonly notes: readonly string[];
}

export type Attributes = Readonly<Record<string, AttributeValue>>;

/** An array that is held in memory as a whole. */
export function heldArray(
  path: string,
  shape: readonly number[],
  type: ElementType,
  values: CountsArray,
  attributes: Attributes = {},
): StoredEntry {
  return {
    entry: { path, shape, type, attributes },
    read: (start, count) => Promise.resolve(cutBlock(values, shape, start, count)),
  };
}

export function heldColumn(
  path: string,
  column: GrowingColumn,
  attributes: Attributes = {},
): StoredEntry {
  return heldArray(path, [column.length], column.range.type, column.narrowed(), attributes);
}

/** Names no two of which are alike: the second "counts" becomes "counts 2". */
export function distinctNames(
  names: readonly string[],
  taken: readonly string[] = [],
): readonly string[] {
  const used = new Set(taken);
  return names.map((name) => {
    let distinct = name;
    for (let i = 2; used.has(distinct); i++) distinct = `${name} ${i}`;
    used.add(distinct);
    return distinct;
  });
}
