/** One scan of 3 × 4 pixels and 24 channels, and the bytes of it in every format and layout. */
import { strToU8, zipSync } from 'fflate';
import { type Hdf5Group, writeHdf5 } from '../../src/io/write/hdf5';
import { vacuumNmFromAir } from '../../src/science/air';
import type { CountsArray } from '../../src/science/scan';
import { evFromNm, shiftCm1FromEv } from '../../src/science/units';

export const ny = 3;
export const nx = 4;
export const nk = 24;
export const laserEv = evFromNm(594.1);

/** nm in air, ascending, steps not uniform */
export const wavelengthsNm = Float64Array.from(
  { length: nk },
  (_, k) => 600 + 2 * k - 0.01 * k * k,
);
export const energiesEv = wavelengthsNm.map((nm) => evFromNm(vacuumNmFromAir(nm)));
export const shiftsCm1 = energiesEv.map((ev) => shiftCm1FromEv(ev, laserEv));

/** Counts of pixel (y, x) at the channel of the kth wavelength: whole numbers that need 16 bits. */
export const countsAt = (y: number, x: number, k: number): number =>
  (7919 * (y * nx + x + 1) * (k + 3) + 104_729 * k) % 65_521;

export type Letter = 'y' | 'x' | 'k';

export interface Layout {
  /** C order of these axes */
  readonly order: string;
  readonly isDescending?: boolean;
  readonly isSerpentine?: boolean;
}

/** The cube's values with its axes in this order. */
export function cubeIn({ order, isDescending, isSerpentine }: Layout): {
  readonly shape: readonly number[];
  readonly values: Float64Array;
} {
  const lengths = { y: ny, x: nx, k: nk };
  const shape = [...order].map((letter) => lengths[letter as Letter]);
  const values = new Float64Array(ny * nx * nk);
  for (let i = 0; i < values.length; i++) {
    const at = { y: 0, x: 0, k: 0 };
    let rest = i;
    for (let axis = shape.length - 1; axis >= 0; axis--) {
      at[order[axis] as Letter] = rest % shape[axis];
      rest = Math.floor(rest / shape[axis]);
    }
    const x = isSerpentine === true && at.y % 2 === 1 ? nx - 1 - at.x : at.x;
    values[i] = countsAt(at.y, x, isDescending === true ? nk - 1 - at.k : at.k);
  }
  return { shape, values };
}

export function axisIn(values: Float64Array, isDescending: boolean): Float64Array {
  return isDescending ? values.toReversed() : values;
}

const setters = {
  u2: [
    2,
    (view: DataView, at: number, value: number, little: boolean) =>
      view.setUint16(at, value, little),
  ],
  i4: [
    4,
    (view: DataView, at: number, value: number, little: boolean) =>
      view.setInt32(at, value, little),
  ],
  i8: [
    8,
    (view: DataView, at: number, value: number, little: boolean) =>
      view.setBigInt64(at, BigInt(value), little),
  ],
  f4: [
    4,
    (view: DataView, at: number, value: number, little: boolean) =>
      view.setFloat32(at, value, little),
  ],
  f8: [
    8,
    (view: DataView, at: number, value: number, little: boolean) =>
      view.setFloat64(at, value, little),
  ],
} as const;

export type NpyType = keyof typeof setters;

/** npy format 1.0 (NumPy Enhancement Proposal 1); Fortran order lists the first axis fastest. */
export function npyBytes(
  values: ArrayLike<number>,
  shape: readonly number[],
  {
    type = 'f8',
    endian = '<',
    isFortran = false,
  }: { type?: NpyType; endian?: '<' | '>'; isFortran?: boolean } = {},
): Uint8Array {
  const dict = `{'descr': '${endian}${type}', 'fortran_order': ${isFortran ? 'True' : 'False'}, 'shape': (${shape.join(', ')}${shape.length === 1 ? ',' : ''}), }`;
  const padded = `${dict.padEnd(Math.ceil((dict.length + 11) / 64) * 64 - 11)}\n`;
  const [size, set] = setters[type];
  const bytes = new Uint8Array(10 + padded.length + values.length * size);
  bytes.set([0x93, 0x4e, 0x55, 0x4d, 0x50, 0x59, 1, 0]);
  const view = new DataView(bytes.buffer);
  view.setUint16(8, padded.length, true);
  bytes.set(strToU8(padded), 10);
  for (let i = 0; i < values.length; i++) {
    const from = isFortran ? cIndexOf(i, shape) : i;
    set(view, 10 + padded.length + i * size, values[from], endian === '<');
  }
  return bytes;
}

/** Where the ith value of Fortran order stands in C order. */
function cIndexOf(i: number, shape: readonly number[]): number {
  let rest = i;
  let at = 0;
  const index = shape.map((length) => {
    const here = rest % length;
    rest = Math.floor(rest / length);
    return here;
  });
  for (let axis = 0; axis < shape.length; axis++) at = at * shape[axis] + index[axis];
  return at;
}

export function npzBytes(members: Readonly<Record<string, Uint8Array>>): Uint8Array {
  return zipSync(
    Object.fromEntries(Object.entries(members).map(([name, bytes]) => [`${name}.npy`, bytes])),
  );
}

export function hdf5Bytes(
  root: Hdf5Group['children'],
  attributes: Hdf5Group['attributes'] = {},
): Promise<Uint8Array> {
  return writeHdf5({ kind: 'group', attributes, children: root });
}

/** Baseline TIFF 6.0: one uncompressed strip a page, 16-bit unsigned integers or 32-bit floats. */
export function tiffBytes(
  pages: readonly CountsArray[],
  { isLittle = true, isFloat = false }: { isLittle?: boolean; isFloat?: boolean } = {},
): Uint8Array {
  const sampleBytes = isFloat ? 4 : 2;
  const pixels = nx * ny;
  const entries = 10;
  const directoryBytes = 2 + 12 * entries + 4;
  const pageBytes = directoryBytes + pixels * sampleBytes;
  const bytes = new Uint8Array(8 + pages.length * pageBytes);
  const view = new DataView(bytes.buffer);
  bytes.set(strToU8(isLittle ? 'II' : 'MM'));
  view.setUint16(2, 42, isLittle);
  view.setUint32(4, 8, isLittle);
  pages.forEach((page, number) => {
    const at = 8 + number * pageBytes;
    const data = at + directoryBytes;
    view.setUint16(at, entries, isLittle);
    // Width, length, bits, compression, photometric, strip offset, samples, rows per strip, strip bytes, sample format.
    const tags = [
      [256, 4, nx],
      [257, 4, ny],
      [258, 3, 8 * sampleBytes],
      [259, 3, 1],
      [262, 3, 1],
      [273, 4, data],
      [277, 3, 1],
      [278, 4, ny],
      [279, 4, pixels * sampleBytes],
      [339, 3, isFloat ? 3 : 1],
    ] as const;
    tags.forEach(([tag, type, value], i) => {
      const entry = at + 2 + 12 * i;
      view.setUint16(entry, tag, isLittle);
      view.setUint16(entry + 2, type, isLittle);
      view.setUint32(entry + 4, 1, isLittle);
      if (type === 3) view.setUint16(entry + 8, value, isLittle);
      else view.setUint32(entry + 8, value, isLittle);
    });
    const next = number + 1 < pages.length ? at + pageBytes : 0;
    view.setUint32(at + 2 + 12 * entries, next, isLittle);
    for (let i = 0; i < pixels; i++) {
      if (isFloat) view.setFloat32(data + 4 * i, page[i], isLittle);
      else view.setUint16(data + 2 * i, page[i], isLittle);
    }
  });
  return bytes;
}

/** One row per pixel: leading x and y, header of axis values. */
export function rowsText(
  axis: Float64Array,
  layout: Layout,
  separator: string,
  mark = '.',
): Uint8Array {
  const { values } = cubeIn({ ...layout, order: 'yxk' });
  const written = (value: number): string => String(value).replace('.', mark);
  const lines = [['x', 'y', ...[...axis].map(written)].join(separator)];
  for (let pixel = 0; pixel < ny * nx; pixel++) {
    const counts = values.subarray(pixel * nk, (pixel + 1) * nk);
    lines.push([pixel % nx, Math.floor(pixel / nx), ...counts].join(separator));
  }
  return strToU8(`${lines.join('\n')}\n`);
}

/** Long rows: x, y, axis, counts. */
export function longText(
  axis: Float64Array,
  axisName: string,
  layout: Layout,
  separator: string,
): Uint8Array {
  const { values } = cubeIn({ ...layout, order: 'yxk' });
  const lines = [['x_um', 'y_um', axisName, 'counts'].join(separator)];
  for (let pixel = 0; pixel < ny * nx; pixel++) {
    for (let k = 0; k < nk; k++) {
      const place = [(0.5 * (pixel % nx)).toFixed(1), (0.25 * Math.floor(pixel / nx)).toFixed(2)];
      lines.push([...place, axis[k], values[pixel * nk + k]].join(separator));
    }
  }
  return strToU8(`${lines.join('\r\n')}\r\n`);
}

/** One spectrum, of pixel (1, 2). */
export function spectrumText(
  axis: Float64Array,
  header: string | null,
  separator: string,
): Uint8Array {
  const lines = header === null ? [] : [header];
  for (let k = 0; k < nk; k++) lines.push([axis[k], countsAt(1, 2, k)].join(separator));
  return strToU8(`${lines.join('\n')}\n`);
}

/** JCAMP-DX 4.24, (XY..XY) pairs of pixel (1, 2). */
export function jcampBytes(): Uint8Array {
  const pairs = Array.from({ length: nk }, (_, k) => `${wavelengthsNm[k]}, ${countsAt(1, 2, k)}`);
  const lines = [
    '##TITLE= pixel 1, 2',
    '##JCAMP-DX= 4.24',
    '##DATA TYPE= FLUORESCENCE SPECTRUM',
    '##ORIGIN= test',
    '##OWNER= public domain',
    '##XUNITS= NANOMETERS',
    '##YUNITS= COUNTS',
    `##FIRSTX= ${wavelengthsNm[0]}`,
    `##LASTX= ${wavelengthsNm[nk - 1]}`,
    `##NPOINTS= ${nk}`,
    '##XYPOINTS= (XY..XY)',
    ...pairs,
    '##END=',
  ];
  return strToU8(lines.join('\n'));
}
