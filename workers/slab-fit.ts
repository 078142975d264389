/** What one worker does of a fit: the nodes in its rows, then its rows; handed on in tiles, stopped between them. */
import { pixelSpectrum, type TiledCounts } from '../src/science/bands/tiled-counts';
import { createFitModel } from '../src/science/fit/fit-model';
import {
  nodeCount,
  nodeOf,
  nodePixel,
  nodesInRows,
  rowsInOrder,
} from '../src/science/fit/fit-order';
import { type FitPlan, fitStatus } from '../src/science/fit/fit-plan';
import { qualityAt } from '../src/science/fit/fit-record';
import { noSeeds, PixelFitter, type Seeds } from '../src/science/fit/pixel-fitter';
import type { EnergyAxis } from '../src/science/scan';
import type { FitKnown, FitTile, RowRange } from './engine';
import { createFitKernel } from './kernel/fit-kernel';
import { nextTurn } from './turn';

/** Pixels of a tile, about 20 ms of work. */
const tilePixels = 64;

export interface SlabToFit {
  readonly tiled: TiledCounts;
  readonly rows: RowRange;
  readonly ny: number;
  readonly nx: number;
  readonly axis: EnergyAxis;
}

type OnTile = (tile: FitTile) => Promise<void>;

/** One plan on one slab. */
export class SlabFit {
  readonly #slab: SlabToFit;
  readonly #plan: FitPlan;
  readonly #fitter: PixelFitter;
  readonly #spectrum: Float64Array;

  constructor(slab: SlabToFit, plan: FitPlan) {
    this.#slab = slab;
    this.#plan = plan;
    this.#fitter = new PixelFitter(createFitModel(plan, slab.axis), createFitKernel);
    this.#spectrum = new Float64Array(slab.tiled.nk);
  }

  /** Fits the nodes that lie in the slab's rows. @returns false when it was stopped */
  async nodes(known: FitKnown, signal: AbortSignal, onTile: OnTile): Promise<boolean> {
    const { rows, nx } = this.#slab;
    const tiles = new Tiles(this.#fitter.layout.length, onTile);
    for (const { y, x } of nodesInRows(this.#slab, rows.y0, rows.y1)) {
      if (this.#knownRow(known, y * nx + x) !== null) continue;
      tiles.add(y * nx + x, this.#fitter.fit(this.#window(y, x), noSeeds));
      if (tiles.isFull && !(await tiles.handOn(signal))) return tiles.finish(signal);
    }
    return tiles.finish(signal);
  }

  /**
   * Fits the slab's rows.
   *
   * @param nodes - rows of all of the scan's nodes, in their order
   * @returns false when it was stopped
   */
  async rows(
    nodes: Float64Array,
    usualChi2r: number,
    known: FitKnown,
    signal: AbortSignal,
    onTile: OnTile,
  ): Promise<boolean> {
    const { rows, ny, nx } = this.#slab;
    const { length } = this.#fitter.layout;
    const across = nodeCount(nx);
    const tiles = new Tiles(length, onTile);
    const left = new Float64Array(length);
    for (const y of rowsInOrder(rows.y0, rows.y1)) {
      const isNodeRow = nodePixel(nodeOf(y), ny) === y;
      let hasLeft = false;
      for (let x = 0; x < nx; x++) {
        const at = length * (nodeOf(y) * across + nodeOf(x));
        const node = nodes.subarray(at, at + length);
        const isNode = isNodeRow && nodePixel(nodeOf(x), nx) === x;
        const done = isNode ? node : this.#knownRow(known, y * nx + x);
        if (done !== null) left.set(done);
        else {
          const seeds: Seeds =
            this.#plan.seed === 'start'
              ? { rows: [], usualChi2r }
              : { rows: [hasLeft ? left : null, node], usualChi2r };
          left.set(this.#fitter.fit(this.#window(y, x), seeds));
          tiles.add(y * nx + x, left);
          if (tiles.isFull && !(await tiles.handOn(signal))) return tiles.finish(signal);
        }
        hasLeft = true;
      }
    }
    return tiles.finish(signal);
  }

  #window(y: number, x: number): Float64Array {
    const { tiled, rows, nx } = this.#slab;
    pixelSpectrum(tiled, (y - rows.y0) * nx + x, this.#spectrum);
    return this.#spectrum.subarray(this.#plan.firstChannel, this.#plan.endChannel);
  }

  /** The row of a pixel that was fitted before; null for one that was not. */
  #knownRow(known: FitKnown, pixel: number): Float64Array | null {
    if (known === null) return null;
    const { layout } = this.#fitter;
    const at = (pixel - this.#slab.rows.y0 * this.#slab.nx) * layout.length;
    const row = known.subarray(at, at + layout.length);
    const status = row[qualityAt(layout, 'status')];
    return Number.isNaN(status) || status === fitStatus.notFitted ? null : row;
  }
}

/** Rows of fitted pixels, gathered until there are enough to be sent. */
class Tiles {
  readonly #length: number;
  readonly #onTile: OnTile;
  readonly #sent: Promise<void>[] = [];
  #pixels: number[] = [];
  #records: Float64Array;

  constructor(length: number, onTile: OnTile) {
    this.#length = length;
    this.#onTile = onTile;
    this.#records = new Float64Array(length * tilePixels);
  }

  get isFull(): boolean {
    return this.#pixels.length >= tilePixels;
  }

  add(pixel: number, record: Float64Array): void {
    this.#records.set(record, this.#pixels.length * this.#length);
    this.#pixels.push(pixel);
  }

  /** Sends what there is and lets messages in. @returns false when the call was stopped */
  async handOn(signal: AbortSignal): Promise<boolean> {
    if (this.#pixels.length > 0) {
      const pixels = Int32Array.from(this.#pixels);
      const records = this.#records.slice(0, this.#pixels.length * this.#length);
      this.#pixels = [];
      this.#sent.push(this.#onTile({ pixels, records }));
    }
    await nextTurn();
    return !signal.aborted;
  }

  /** The same for what is left; everything sent has then arrived. */
  async finish(signal: AbortSignal): Promise<boolean> {
    await this.handOn(signal);
    await Promise.all(this.#sent);
    return !signal.aborted;
  }
}
