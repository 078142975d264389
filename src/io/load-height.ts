/** The height map on the scan's own pixels, in nm. */
import { RimlightError } from '../errors';
import type { PixelMap } from '../science/scan';
import type { Container, ReadOptions } from './container';
import type { ScanPlan } from './scan-plan';

/**
 * The two axes of a map; a third of length one (the single page of a TIFF) does not count. Null for
 * any other array.
 */
export function mapShape(shape: readonly number[]): readonly [number, number] | null {
  const long = shape.length === 3 ? shape.toSpliced(shape[0] === 1 ? 0 : 2, 1) : shape;
  const isMap = long.length === 2 && (shape.length === 2 || shape[0] === 1 || shape[2] === 1);
  return isMap ? [long[0], long[1]] : null;
}

/**
 * Reads the plan's height map.
 *
 * A shift [x, y] says how many pixels the map lies to the right of and below the counts: the height
 * at a pixel is the map's at (x + shift, y + shift), between its pixels by bilinear interpolation.
 * Pixels that fall outside the map, or beside no data, are NaN.
 *
 * @param container - the scan file, or the companion named by `plan.height.file`
 * @returns (ny, nx), nm
 * @throws RimlightError 'fault' - when the plan has no height map; 'scan' - when the file is damaged
 */
export async function loadHeight(
  plan: ScanPlan,
  container: Container,
  options: ReadOptions = {},
): Promise<PixelMap> {
  const { height, meta, cube } = plan;
  const entry = container.entries.find(({ path }) => path === height?.path);
  const shape = entry === undefined ? null : mapShape(entry.shape);
  if (height === null || entry === undefined || shape === null) {
    throw new RimlightError('fault', {
      what: 'the plan’s height map is not in this file',
      where: meta.name,
      hint: 'Please report this.',
    });
  }
  const { ny, nx } = meta.shape;
  const stored = await container.read(
    entry.path,
    entry.shape.map(() => 0),
    entry.shape,
    options,
  );
  // A square map inside the scan file lies as the cube does; otherwise its shape tells.
  const isSquare = shape[0] === shape[1];
  const isColumnsFirst = isSquare
    ? height.file === null && cube.xAxis >= 0 && cube.xAxis < cube.yAxis
    : shape[0] !== ny;
  const values = new Float64Array(ny * nx);
  for (let y = 0; y < ny; y++) {
    for (let x = 0; x < nx; x++) {
      values[y * nx + x] = stored[isColumnsFirst ? x * ny + y : y * nx + x] * height.unitNm;
    }
  }
  const [shiftX, shiftY] = height.shiftPx;
  const map = { ny, nx, values };
  return shiftX === 0 && shiftY === 0 ? map : shifted(map, shiftX, shiftY);
}

function shifted(map: PixelMap, shiftX: number, shiftY: number): PixelMap {
  const { ny, nx } = map;
  const values = new Float64Array(ny * nx);
  for (let y = 0; y < ny; y++) {
    for (let x = 0; x < nx; x++) values[y * nx + x] = between(map, x + shiftX, y + shiftY);
  }
  return { ny, nx, values };
}

/** Bilinear between the four pixels around; a neighbour of no weight does not count, even where it is missing. */
function between({ ny, nx, values }: PixelMap, x: number, y: number): number {
  if (x < 0 || y < 0 || x > nx - 1 || y > ny - 1) return Number.NaN;
  const x0 = Math.floor(x);
  const y0 = Math.floor(y);
  let sum = 0;
  for (const [dy, wy] of [
    [0, 1 - (y - y0)],
    [1, y - y0],
  ] as const) {
    for (const [dx, wx] of [
      [0, 1 - (x - x0)],
      [1, x - x0],
    ] as const) {
      if (wx * wy > 0) sum += wx * wy * values[(y0 + dy) * nx + x0 + dx];
    }
  }
  return sum;
}
