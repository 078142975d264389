/** The fast moment kernel, owner of its WebAssembly memory; the plain one where vectors are not to be had. */
import {
  createPlainKernel,
  type HighPlanes,
  type LowPlanes,
  type MomentKernel,
  type TileRun,
} from '../../src/science/bands/moment-kernel';
import type { CountsArray } from '../../src/science/scan';
import { momentModuleBytes, pixelsPerTurn, valuesPerTurn } from './moment-module';

type Numbers = (...numbers: readonly number[]) => void;
type MomentExports = WebAssembly.Exports & {
  readonly memory: WebAssembly.Memory;
  readonly low: Numbers;
  readonly high: Numbers;
  readonly widen: Numbers;
};

function isMomentExports(exports: WebAssembly.Exports): exports is MomentExports {
  const { memory, low, high, widen } = exports;
  return (
    memory instanceof WebAssembly.Memory &&
    [low, high, widen].every((exported) => typeof exported === 'function')
  );
}

const pageBytes = 65536;

/**
 * @param tilePixels - most pixels of a run
 * @param nk - channels of the axis
 */
export function createMomentKernel(tilePixels: number, nk: number): MomentKernel {
  const exports = momentExports();
  return exports === null ? createPlainKernel(tilePixels) : new WasmKernel(exports, tilePixels, nk);
}

let compiled: WebAssembly.Module | null = null;

/** Null where WebAssembly has no vectors: results are the same, only slower. */
function momentExports(): MomentExports | null {
  try {
    compiled ??= new WebAssembly.Module(momentModuleBytes());
    const { exports } = new WebAssembly.Instance(compiled);
    return isMomentExports(exports) ? exports : null;
  } catch (error) {
    if (error instanceof WebAssembly.CompileError) return null;
    throw error;
  }
}

/** Memory, in doubles: three planes of results, the energies, the input, and 16-bit counts on their way into it. */
class WasmKernel implements MomentKernel {
  readonly kind = 'vectors';
  readonly #exports: MomentExports;
  /** length of a plane, with room for what the last turn writes too many */
  readonly #plane: number;
  readonly #energiesAt: number;
  readonly #inputAt: number;
  #energies: Float64Array | null = null;
  /** as many values as the input has room for */
  #room = 0;
  #input = new Float64Array(0);
  #narrow = new Uint16Array(0);
  #low: LowPlanes;
  #high: HighPlanes;

  constructor(exports: MomentExports, tilePixels: number, nk: number) {
    this.#exports = exports;
    this.#plane = tilePixels + pixelsPerTurn;
    this.#energiesAt = 3 * this.#plane;
    this.#inputAt = this.#energiesAt + nk;
    this.#low = [this.#view(0), this.#view(1), this.#view(2)];
    this.#high = [this.#view(0), this.#view(1)];
    this.#reserve(tilePixels);
  }

  fill(counts: CountsArray): Float64Array {
    if (counts.length > this.#room) this.#reserve(counts.length);
    if (counts instanceof Uint16Array && counts.length > 0) {
      this.#narrow.set(counts);
      const from = this.#narrow.byteOffset;
      this.#exports.widen(from, from + counts.byteLength, 8 * this.#inputAt);
    } else this.#input.set(counts);
    return this.#input;
  }

  /** Growing takes the old buffer away from under every view. */
  #reserve(values: number): void {
    const { memory } = this.#exports;
    this.#room = values + Math.max(pixelsPerTurn, valuesPerTurn);
    const narrowAt = 8 * (this.#inputAt + this.#room);
    const missing = narrowAt + 2 * this.#room - memory.buffer.byteLength;
    if (missing > 0) memory.grow(Math.ceil(missing / pageBytes));
    this.#low = [this.#view(0), this.#view(1), this.#view(2)];
    this.#high = [this.#view(0), this.#view(1)];
    this.#input = new Float64Array(memory.buffer, 8 * this.#inputAt, this.#room);
    this.#narrow = new Uint16Array(memory.buffer, narrowAt, this.#room);
  }

  low(run: TileRun, energies: Float64Array): LowPlanes {
    const { low } = this.#exports;
    const at = 8 * this.#plane;
    if (run.k1 > run.k0) low(...this.#arguments(run, energies), 0, at, 2 * at);
    // The loops of the kernel turn at least once.
    else for (const plane of this.#low) plane.fill(0);
    return this.#low;
  }

  high(run: TileRun, energies: Float64Array): HighPlanes {
    const { high } = this.#exports;
    if (run.k1 > run.k0) high(...this.#arguments(run, energies), 0, 8 * this.#plane);
    else for (const plane of this.#high) plane.fill(0);
    return this.#high;
  }

  #arguments({ pixels, k0, k1 }: TileRun, energies: Float64Array): readonly number[] {
    if (this.#energies !== energies) {
      const { buffer } = this.#exports.memory;
      new Float64Array(buffer, 8 * this.#energiesAt, energies.length).set(energies);
      this.#energies = energies;
    }
    return [8 * this.#inputAt, pixels, k1 - k0, 8 * (this.#energiesAt + k0)];
  }

  #view(moment: number): Float64Array {
    return new Float64Array(this.#exports.memory.buffer, 8 * moment * this.#plane, this.#plane);
  }
}
