/** A container in memory, with every block read counted: what detection and loading are tested against. */
import type {
  ArrayEntry,
  AttributeValue,
  Container,
  ElementType,
  FormatName,
} from '../../src/io/container';
import type { CountsArray } from '../../src/science/scan';

export interface FakeArray {
  readonly shape: readonly number[];
  readonly data: CountsArray | readonly number[];
  readonly type?: ElementType;
  readonly attributes?: Readonly<Record<string, AttributeValue>>;
}

export interface FakeFile {
  readonly format?: FormatName;
  readonly arrays: Readonly<Record<string, FakeArray>>;
  readonly groups?: Readonly<Record<string, Readonly<Record<string, AttributeValue>>>>;
  readonly facts?: Readonly<Record<string, string | number>>;
  readonly notes?: readonly string[];
}

export interface FakeContainer extends Container {
  /** values handed out so far */
  readonly handedOut: { values: number; largest: number; reads: number };
}

const typeNames = new Map<unknown, ElementType>([
  [Uint8Array, 'uint8'],
  [Int8Array, 'int8'],
  [Uint16Array, 'uint16'],
  [Int16Array, 'int16'],
  [Uint32Array, 'uint32'],
  [Int32Array, 'int32'],
  [Float32Array, 'float32'],
  [Float64Array, 'float64'],
]);

export function fakeContainer(file: FakeFile): FakeContainer {
  const entries: ArrayEntry[] = Object.entries(file.arrays).map(([path, array]) => ({
    path,
    shape: array.shape,
    type: array.type ?? typeNames.get(array.data.constructor) ?? 'float64',
    attributes: array.attributes ?? {},
  }));
  const handedOut = { values: 0, largest: 0, reads: 0 };
  return {
    format: file.format ?? 'HDF5',
    entries,
    groups: Object.entries(file.groups ?? {}).map(([path, attributes]) => ({ path, attributes })),
    facts: file.facts ?? {},
    notes: file.notes ?? [],
    handedOut,
    read(path, start, count) {
      const { shape, data } = file.arrays[path];
      const source = Array.isArray(data) ? Float64Array.from(data) : (data as CountsArray);
      const block = blockOf(source, shape, start, count);
      handedOut.values += block.length;
      handedOut.largest = Math.max(handedOut.largest, block.length);
      handedOut.reads++;
      return Promise.resolve(block);
    },
    close() {},
  };
}

function blockOf(
  source: CountsArray,
  shape: readonly number[],
  start: readonly number[],
  count: readonly number[],
): CountsArray {
  if (start.length !== shape.length || count.length !== shape.length)
    throw new Error('rank differs');
  const size = count.reduce((product, length) => product * length, 1);
  const block = new (source.constructor as new (length: number) => CountsArray)(size);
  const index = start.slice();
  for (let i = 0; i < size; i++) {
    let offset = 0;
    for (let axis = 0; axis < shape.length; axis++) {
      if (index[axis] < 0 || index[axis] >= shape[axis]) throw new Error('outside the array');
      offset = offset * shape[axis] + index[axis];
    }
    block[i] = source[offset];
    for (let axis = shape.length - 1; axis >= 0; axis--) {
      if (++index[axis] < start[axis] + count[axis]) break;
      index[axis] = start[axis];
    }
  }
  return block;
}

/** first, first + step, … */
export function ramp(length: number, first: number, step: number): Float64Array {
  return Float64Array.from({ length }, (_, i) => first + i * step);
}

/** Whole numbers 0 … size − 1: each value tells where it was. */
export function numbered(...shape: readonly number[]): FakeArray {
  const size = shape.reduce((product, length) => product * length, 1);
  return { shape, data: Int32Array.from({ length: size }, (_, i) => i) };
}
