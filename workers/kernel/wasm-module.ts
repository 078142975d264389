/**
 * Just enough of WebAssembly's binary format to write a kernel down: functions of 32-bit numbers on one
 * memory, with 128-bit vectors of two doubles.
 *
 * @see WebAssembly Core Specification 2.0, chapter 5, Binary Format
 */

/** Instructions, as bytes. */
export type Code = readonly number[];

export interface WasmFunction {
  readonly name: string;
  /** parameters, all 32-bit numbers; locals 0, 1, … */
  readonly parameters: number;
  /** the locals after them, in order */
  readonly locals: readonly ('i32' | 'v128')[];
  readonly body: Code;
}

const i32 = 0x7f;
const v128 = 0x7b;
const empty = 0x40;
const end = 0x0b;

/** Unsigned LEB128. */
function unsigned(value: number): number[] {
  const bytes: number[] = [];
  let rest = value;
  do {
    const more = rest >= 128;
    bytes.push((rest & 0x7f) | (more ? 0x80 : 0));
    rest >>>= 7;
  } while (rest > 0);
  return bytes;
}

/** Signed LEB128 of a 32-bit number. */
function signed(value: number): number[] {
  const bytes: number[] = [];
  let rest = value | 0;
  for (;;) {
    const byte = rest & 0x7f;
    rest >>= 7;
    const isLast = (rest === 0 && (byte & 0x40) === 0) || (rest === -1 && (byte & 0x40) !== 0);
    bytes.push(isLast ? byte : byte | 0x80);
    if (isLast) return bytes;
  }
}

const vector = (items: readonly Code[]): number[] => [...unsigned(items.length), ...items.flat()];
const section = (id: number, body: Code): number[] => [id, ...unsigned(body.length), ...body];
const simd = (opcode: number): number[] => [0xfd, ...unsigned(opcode)];
/** alignment 2³, offset */
const address = (offset: number): number[] => [3, ...unsigned(offset)];

export const get = (local: number): Code => [0x20, ...unsigned(local)];
export const set = (local: number): Code => [0x21, ...unsigned(local)];
export const tee = (local: number): Code => [0x22, ...unsigned(local)];
export const constant = (value: number): Code => [0x41, ...signed(value)];
export const plus: Code = [0x6a];
export const shiftLeft: Code = [0x74];
export const isBelow: Code = [0x49];

/** Two doubles from memory, to memory, or one double from memory twice. */
export const loadPair = (offset: number): Code => [...simd(0x00), ...address(offset)];
export const storePair = (offset: number): Code => [...simd(0x0b), ...address(offset)];
export const loadTwice = (offset: number): Code => [...simd(0x0a), ...address(offset)];
export const zeroPair: Code = [...simd(0x0c), ...new Array<number>(16).fill(0)];
export const addPairs: Code = simd(0xf0);
export const multiplyPairs: Code = simd(0xf2);

/** Lanes of 16 bits, the lower or the upper four, as lanes of 32; the lower two of these as doubles. */
export const widenLower: Code = simd(0xa9);
export const widenUpper: Code = simd(0xaa);
export const toDoubles: Code = simd(0xfe);
const upperBytes = [8, 9, 10, 11, 12, 13, 14, 15];
/** The upper half of a vector in place of its lower one; takes the vector twice. */
export const upperHalf: Code = [...simd(0x0d), ...upperBytes, ...upperBytes];

/** Runs `body` and again as long as it leaves a number other than 0. */
export const repeatWhile = (...body: readonly Code[]): Code => [
  ...[0x03, empty],
  ...body.flat(),
  ...[0x0d, 0x00, end],
];

/** A module that exports its functions and its memory, as `memory`, of one page at first. */
export function wasmModule(functions: readonly WasmFunction[]): Uint8Array<ArrayBuffer> {
  const nameOf = (name: string): number[] => vector([...name].map((char) => [char.charCodeAt(0)]));
  const types = functions.map(({ parameters }) => [
    0x60,
    ...vector(new Array<Code>(parameters).fill([i32])),
    0x00,
  ]);
  const exported = functions.map(({ name }, index) => [...nameOf(name), 0x00, ...unsigned(index)]);
  const bodies = functions.map(({ locals, body }) => {
    const declared = locals.map((type) => [1, type === 'i32' ? i32 : v128]);
    const code = [...vector(declared), ...body, end];
    return [...unsigned(code.length), ...code];
  });
  return Uint8Array.from([
    ...[0x00, 0x61, 0x73, 0x6d, 0x01, 0x00, 0x00, 0x00],
    ...section(1, vector(types)),
    ...section(3, vector(functions.map((_, index) => unsigned(index)))),
    ...section(5, vector([[0x00, 0x01]])),
    ...section(7, vector([[...nameOf('memory'), 0x02, 0x00], ...exported])),
    ...section(10, vector(bodies)),
  ]);
}
