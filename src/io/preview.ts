/** A first look at a scan at bounded cost: totals of pixels evenly thinned, and their mean spectrum. */
import { RimlightError, throwIfAborted } from '../errors';
import type { CountsArray } from '../science/scan';
import type { Container, ReadOptions } from './container';
import { bytesOfType } from './dtype';
import { type Block, blocksOf, regionOf } from './load-slab';
import type { CubePlan, Preview, ScanPlan } from './scan-plan';

/** Bytes asked of the file at most (whole rows are read, of which a part is used). */
const previewBytes = 64 << 20;
/**
 * Where channels are the slowest axis, as in a stack of pages, every row lies in every page, and a
 * packed page has to be unpacked whole for one row of it: up to this size all pages are gone through
 * once instead, beyond it only a few rows are taken.
 */
const stackBytes = 512 << 20;
const stackRows = 16;

/** How pixels are thinned, and the blocks that hold them. */
interface Thinning {
  readonly step: number;
  readonly blocks: readonly Block[];
}

/**
 * Totals and mean spectrum of one pixel in every `step` rows and columns.
 *
 * No data (NaN) is left out of both; a pixel without any has a total of NaN, a channel without any a
 * mean of NaN.
 *
 * @throws RimlightError 'scan' - when no value looked at is a number
 */
export async function previewScan(
  container: Container,
  plan: ScanPlan,
  options: ReadOptions = {},
): Promise<Preview> {
  const { cube, meta } = plan;
  const type = container.entries.find(({ path }) => path === cube.path)?.type ?? 'float64';
  const { step, blocks } = thinningOf(plan, bytesOfType[type]);
  const ny = Math.ceil(meta.shape.ny / step);
  const nx = Math.ceil(meta.shape.nx / step);
  const sums = newSums(cube, { ny, nx, nk: meta.shape.nk }, step, meta.shape.nx);
  for (const [index, block] of blocks.entries()) {
    throwIfAborted(options.signal, `looking at ${meta.name}`);
    const values = await container.read(cube.path, block.start, block.count);
    addBlock(values, block, cube, sums);
    options.onProgress?.((index + 1) / blocks.length);
  }
  if (sums.pixelCount.every((count) => count === 0)) {
    throw new RimlightError('scan', {
      what: 'the scan holds no data: every value looked at is missing (NaN)',
      where: meta.name,
      hint: 'Check that the right array is the cube (scan.data).',
    });
  }
  const totals = sums.totals.map((total, pixel) =>
    sums.pixelCount[pixel] > 0 ? total : Number.NaN,
  );
  const meanSpectrum = sums.spectrum.map((sum, k) => sum / sums.channelCount[k]);
  return { ny, nx, totals, meanSpectrum, step };
}

/** Thinner until what must be read fits: whole planes along the slower axis of space, else pixel by pixel. */
function thinningOf({ cube, meta }: ScanPlan, bytes: number): Thinning {
  const { ny, nx } = meta.shape;
  const budget = previewBytes / bytes;
  const whole = regionOf(cube, { y0: 0, y1: ny });
  const channels = cube.fileShape[cube.kAxis];
  const values = ny * nx * channels;
  if (values <= budget) return { step: 1, blocks: blocksOf(whole.start, whole.count) };
  // Rows of a serpentine scan keep their direction when only even ones are taken.
  const stepWhere = (fits: (step: number) => boolean): number => {
    let step = 2;
    while (!fits(step)) step += cube.serpentine ? 2 : 1;
    return step;
  };
  const pixelStep = stepWhere(
    (step) => Math.ceil(ny / step) * Math.ceil(nx / step) * channels <= budget,
  );
  const isStack = cube.kAxis === 0;
  if (isStack && values * bytes <= stackBytes) {
    return { step: pixelStep, blocks: blocksOf(whole.start, whole.count) };
  }
  const isColumnsSlower = ny === 1 || (cube.xAxis >= 0 && cube.xAxis < cube.yAxis);
  const slowAxis = isColumnsSlower ? cube.xAxis : cube.yAxis;
  const slowLength = isColumnsSlower ? nx : ny;
  const plane = (isColumnsSlower ? ny : nx) * channels;
  if (plane <= budget) {
    const most = isStack ? stackRows : slowLength;
    const step = stepWhere((one) => {
      const planes = Math.ceil(slowLength / one);
      return planes * plane <= budget && planes <= most;
    });
    return { step, blocks: everyStep(whole, slowAxis, step) };
  }
  const planes = everyStep(whole, slowAxis, pixelStep);
  const fastAxis = isColumnsSlower ? cube.yAxis : cube.xAxis;
  return {
    step: pixelStep,
    blocks: fastAxis < 0 ? planes : planes.flatMap((one) => everyStep(one, fastAxis, pixelStep)),
  };
}

function everyStep(block: Block, axis: number, step: number): Block[] {
  const blocks: Block[] = [];
  for (let at = 0; at < block.count[axis]; at += step) {
    blocks.push({
      start: block.start.with(axis, block.start[axis] + at),
      count: block.count.with(axis, 1),
    });
  }
  return blocks;
}

interface Sums {
  readonly step: number;
  /** columns of the whole scan, for serpentine rows */
  readonly columns: number;
  /** columns of the preview */
  readonly nx: number;
  /** scan channel of each file channel; −1 for one left out */
  readonly channelOf: Int32Array;
  readonly totals: Float64Array;
  readonly pixelCount: Uint32Array;
  readonly spectrum: Float64Array;
  readonly channelCount: Uint32Array;
}

function newSums(
  cube: CubePlan,
  { ny, nx, nk }: { readonly ny: number; readonly nx: number; readonly nk: number },
  step: number,
  columns: number,
): Sums {
  const channelOf = new Int32Array(cube.fileShape[cube.kAxis]).fill(-1);
  cube.channels.forEach((fileChannel, k) => {
    channelOf[fileChannel] = k;
  });
  return {
    step,
    columns,
    nx,
    channelOf,
    totals: new Float64Array(ny * nx),
    pixelCount: new Uint32Array(ny * nx),
    spectrum: new Float64Array(nk),
    channelCount: new Uint32Array(nk),
  };
}

/** Adds the pixels of a block that fall on the preview's grid; others were read along with them. */
function addBlock(values: CountsArray, block: Block, cube: CubePlan, sums: Sums): void {
  const strideOf = (axis: number): number =>
    axis < 0 ? 0 : block.count.slice(axis + 1).reduce((product, length) => product * length, 1);
  const startOf = (axis: number): number => (axis < 0 ? 0 : block.start[axis]);
  const countOf = (axis: number): number => (axis < 0 ? 1 : block.count[axis]);
  const { step } = sums;
  const kStride = strideOf(cube.kAxis);
  const k0 = startOf(cube.kAxis);
  const channels = countOf(cube.kAxis);
  for (let j = 0; j < countOf(cube.yAxis); j++) {
    const y = startOf(cube.yAxis) + j;
    if (y % step !== 0) continue;
    for (let i = 0; i < countOf(cube.xAxis); i++) {
      const fileX = startOf(cube.xAxis) + i;
      const x = cube.serpentine && y % 2 === 1 ? sums.columns - 1 - fileX : fileX;
      if (x % step !== 0) continue;
      const pixel = (y / step) * sums.nx + x / step;
      const at = j * strideOf(cube.yAxis) + i * strideOf(cube.xAxis);
      addSpectrum(values, { at, kStride, k0, channels }, pixel, sums);
    }
  }
}

function addSpectrum(
  values: CountsArray,
  { at, kStride, k0, channels }: { at: number; kStride: number; k0: number; channels: number },
  pixel: number,
  { channelOf, totals, pixelCount, spectrum, channelCount }: Sums,
): void {
  for (let k = 0; k < channels; k++) {
    const channel = channelOf[k0 + k];
    const value = values[at + k * kStride];
    if (channel < 0 || !Number.isFinite(value)) continue;
    totals[pixel] += value;
    pixelCount[pixel]++;
    spectrum[channel] += value;
    channelCount[channel]++;
  }
}
