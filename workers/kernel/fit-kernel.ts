/** The fit's kernel in WebAssembly, owner of its memory; the plain one where vectors are not to be had. */
import {
  type CreateFitKernel,
  createPlainFitKernel,
  dataPartOf,
  type FitKernel,
  type PoissonScale,
} from '../../src/science/fit/fit-kernel';
import type { ShapeLoops } from '../../src/science/fit/kernel-evaluate';
import { type KernelGrid, kernelGrid } from '../../src/science/fit/kernel-shapes';
import type { ChannelSpan, FitGrid } from '../../src/science/peaks/shape';
import { fwhmPerSigma } from '../../src/science/peaks/widths';
import { fitModuleBytes } from './fit-module';

type Numbers = (...numbers: (number | boolean)[]) => void;

const loopNames = [
  'weighCounts',
  'weighAlike',
  'normal',
  'addPolynomial',
  'addDecay',
  'addGaussian',
  'addLorentzian',
] as const;

type FitExports = WebAssembly.Exports & { readonly memory: WebAssembly.Memory } & Readonly<
    Record<(typeof loopNames)[number], Numbers>
  >;

function isFitExports(exports: WebAssembly.Exports): exports is FitExports {
  return (
    exports.memory instanceof WebAssembly.Memory &&
    loopNames.every((name) => typeof exports[name] === 'function')
  );
}

let compiled: WebAssembly.Module | null = null;

/** Null where WebAssembly has no vectors: results are the same, only slower. */
function fitExports(): FitExports | null {
  try {
    compiled ??= new WebAssembly.Module(fitModuleBytes());
    const { exports } = new WebAssembly.Instance(compiled);
    return isFitExports(exports) ? exports : null;
  } catch (error) {
    if (error instanceof WebAssembly.CompileError) return null;
    throw error;
  }
}

/** Falls back to the plain kernel. */
export const createFitKernel: CreateFitKernel = (grid, parameters) => {
  const exports = fitExports();
  return exports === null
    ? createPlainFitKernel(grid, parameters)
    : new WasmFitKernel(exports, grid, parameters);
};

const pageBytes = 65536;
/** Vectors read and write two values at a time: one beyond the end of an odd array, and one more edge. */
const padding = 4;

/** Arrays one after the other in the module's memory. */
class Memory {
  readonly #memory: WebAssembly.Memory;
  #at: number;

  /** @param from - address of the first array, in bytes */
  constructor(memory: WebAssembly.Memory, from: number, doubles: number) {
    const missing = from + 8 * doubles - memory.buffer.byteLength;
    if (missing > 0) memory.grow(Math.ceil(missing / pageBytes));
    this.#memory = memory;
    this.#at = from;
  }

  doubles(length: number): Float64Array {
    const view = new Float64Array(this.#memory.buffer, this.#at, length);
    this.#at += 8 * length;
    return view;
  }
}

class WasmFitKernel implements FitKernel {
  readonly kind = 'vectors';
  readonly grid: KernelGrid;
  readonly loops: ShapeLoops;
  readonly counts: Float64Array;
  readonly model: Float64Array;
  readonly columns: readonly Float64Array[];
  readonly sums = { deviance: 0, pearson: 0 };
  readonly #exports: FitExports;
  readonly #channels: number;
  /** as `model`, one value longer where vectors need it */
  readonly #data: Float64Array;
  readonly #weights: Float64Array;
  readonly #residuals: Float64Array;
  readonly #product: Float64Array;
  readonly #matrix: Float64Array;
  readonly #gradient: Float64Array;
  readonly #sums: Float64Array;
  readonly #table: Int32Array;
  /** of each column */
  readonly #addresses: readonly number[];
  #scale: PoissonScale | null = null;

  constructor(exports: FitExports, grid: FitGrid, parameters: number) {
    const { length: channels } = grid.centresEv;
    const padded = channels + padding;
    const doubles = (9 + parameters) * padded + parameters * (parameters + 1) + 2 + 2 * parameters;
    const memory = new Memory(exports.memory, pageBytes, doubles + padding);
    const array = (): Float64Array => memory.doubles(padded);
    const own = kernelGrid(grid);
    const placed = (values: Float64Array, beyond: number): Float64Array => {
      const view = array();
      view.fill(beyond);
      view.set(values);
      return view;
    };
    this.#exports = exports;
    this.#channels = channels;
    const centres = placed(own.centresEv, 0);
    const widths = placed(own.widthsEv, 0);
    const edges = placed(own.edgesEv, own.edgesEv[channels]);
    const offsets = placed(own.offsetsEv, 0);
    this.grid = own;
    this.#data = array().fill(Number.NaN);
    this.#weights = array();
    this.#residuals = array();
    this.#product = array();
    const model = array();
    const columns = Array.from({ length: parameters }, array);
    this.model = model.subarray(0, channels);
    this.columns = columns.map((column) => column.subarray(0, channels));
    this.#addresses = columns.map(addressOf);
    this.counts = new Float64Array(channels);
    this.#matrix = memory.doubles(parameters * parameters);
    this.#gradient = memory.doubles(parameters);
    this.#sums = memory.doubles(2);
    const table = memory.doubles(2 * parameters);
    this.#table = new Int32Array(table.buffer, table.byteOffset, 3 * parameters);
    this.loops = this.#shapeLoops({ centres, widths, edges, offsets, stride: 8 * padded });
  }

  prepare(scale: PoissonScale | null): void {
    this.#scale = scale;
    const { counts } = this;
    const data = this.#data;
    if (scale === null) data.set(counts);
    else for (let k = 0; k < counts.length; k++) data[k] = counts[k] * scale.scale + scale.shift;
  }

  dataPart(): number {
    return this.#scale === null ? 0 : dataPartOf(this.#data.subarray(0, this.#channels));
  }

  weigh(): void {
    const { sums } = this;
    const scale = this.#scale;
    const data = this.#data.byteOffset;
    const model = this.model.byteOffset;
    const weights = this.#weights.byteOffset;
    const residuals = this.#residuals.byteOffset;
    const at = this.#sums.byteOffset;
    if (scale === null) {
      this.#exports.weighAlike(this.#channels, data, model, weights, residuals, at);
      sums.deviance = this.#sums[0];
      sums.pearson = this.#sums[0];
      return;
    }
    const { scale: by, shift, least } = scale;
    this.#exports.weighCounts(
      this.#channels,
      data,
      model,
      weights,
      residuals,
      by,
      shift,
      least,
      at,
    );
    sums.deviance = 2 * this.#sums[0];
    sums.pearson = this.#sums[1];
  }

  normal(
    used: Int32Array,
    spans: readonly ChannelSpan[],
    matrix: Float64Array,
    gradient: Float64Array,
  ): void {
    const size = used.length;
    const table = this.#table;
    for (let i = 0; i < size; i++) {
      const { first, end } = spans[used[i]];
      table[3 * i] = this.#addresses[used[i]];
      table[3 * i + 1] = first;
      table[3 * i + 2] = end;
    }
    this.#exports.normal(
      size,
      addressOf(table),
      addressOf(this.#weights),
      addressOf(this.#residuals),
      addressOf(this.#product),
      addressOf(this.#matrix),
      addressOf(this.#gradient),
    );
    for (let i = 0; i < size * size; i++) matrix[i] = this.#matrix[i];
    for (let i = 0; i < size; i++) gradient[i] = this.#gradient[i];
  }

  #shapeLoops(places: GridPlaces): ShapeLoops {
    const { stride } = places;
    const [centres, widths, edges, offsets] = [
      places.centres,
      places.widths,
      places.edges,
      places.offsets,
    ].map(addressOf);
    const channels = this.#channels;
    const model = addressOf(this.model);
    const columnAt = (first: number, withColumns: boolean): number =>
      withColumns ? this.#addresses[first] : 0;
    const { addPolynomial, addDecay, addGaussian, addLorentzian } = this.#exports;
    return {
      polynomial: (a, b, c) => addPolynomial(channels, offsets, model, a, b, c),
      decay: (first, withColumns, level, length) => {
        const at = columnAt(first, withColumns);
        addDecay(channels, offsets, model, level, length, at, at === 0 ? 0 : at + stride);
      },
      gaussian: (column, { first, end }, withColumns, total, middle, fwhmEv) => {
        const at = columnAt(column, withColumns);
        addGaussian(
          first,
          end,
          centres,
          widths,
          model,
          at,
          stride,
          total,
          middle,
          fwhmEv / fwhmPerSigma,
          fwhmPerSigma,
        );
      },
      lorentzian: (first, withColumns, total, middle, fwhmEv, weight, hasShare) => {
        const at = columnAt(first, withColumns);
        const half = fwhmEv / 2;
        addLorentzian(
          channels,
          edges,
          widths,
          model,
          at,
          stride,
          total,
          middle,
          half,
          weight,
          hasShare,
        );
      },
    };
  }
}

interface GridPlaces {
  readonly centres: Float64Array;
  readonly widths: Float64Array;
  readonly edges: Float64Array;
  readonly offsets: Float64Array;
  /** bytes from one column to the next */
  readonly stride: number;
}

function addressOf({ byteOffset }: Float64Array | Int32Array): number {
  return byteOffset;
}
