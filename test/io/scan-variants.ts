/** Every format, order, direction, unit and number type the one scan is written in. */
import type { ScanChoices } from '../../src/io/scan-choices';
import {
  axisIn,
  cubeIn,
  energiesEv,
  hdf5Bytes,
  jcampBytes,
  laserEv,
  longText,
  nk,
  npyBytes,
  npzBytes,
  nx,
  ny,
  rowsText,
  shiftsCm1,
  spectrumText,
  tiffBytes,
  wavelengthsNm,
} from './variant-files';

export interface Variant {
  readonly name: string;
  readonly file: string;
  readonly bytes: Uint8Array;
  readonly choices?: ScanChoices;
  readonly companions?: Readonly<Record<string, Uint8Array>>;
  /** x and y, where the file gives positions */
  readonly pitchNm?: readonly [x: number, y: number];
  /** only this pixel is in the file */
  readonly pixel?: readonly [y: number, x: number];
}

const axisFile = { 'axis_wavelength_nm.npy': npyBytes(wavelengthsNm, [nk]) };
const integers = (values: Float64Array): Uint16Array => Uint16Array.from(values);
const laser = { value: laserEv, unit: 'eV' } as const;
const pixel = [1, 2] as const;

function npyVariants(): Variant[] {
  const orders = ['yxk', 'ykx', 'xyk', 'xky', 'kyx', 'kxy'].map((order) => {
    const { shape, values } = cubeIn({ order });
    return {
      name: `npy ${order}, stated`,
      file: 'scan.npy',
      bytes: npyBytes(values, shape, { type: 'u2' }),
      choices: { order },
      companions: axisFile,
    };
  });
  const { shape, values } = cubeIn({ order: 'yxk' });
  const types = (['u2', 'i4', 'i8', 'f4', 'f8'] as const).flatMap((type) =>
    (['<', '>'] as const).flatMap((endian) =>
      [false, true].map((isFortran) => ({
        name: `npy ${endian}${type} ${isFortran ? 'Fortran' : 'C'} order`,
        file: 'scan.npy',
        bytes: npyBytes(values, shape, { type, endian, isFortran }),
        companions: axisFile,
      })),
    ),
  );
  const turned = cubeIn({ order: 'yxk', isDescending: true, isSerpentine: true });
  return [
    ...orders,
    ...types,
    {
      name: 'npy without its ending, axis in the recipe, descending and serpentine',
      file: 'unknown',
      bytes: npyBytes(turned.values, turned.shape),
      choices: {
        axis: { values: [...axisIn(wavelengthsNm, true)], kind: 'wavelength', unit: 'nm' },
        serpentine: true,
      },
    },
  ];
}

function npzVariants(): Variant[] {
  const up = cubeIn({ order: 'yxk' });
  const down = cubeIn({ order: 'kxy', isDescending: true });
  const columns = npyBytes(Float64Array.of(0, 0.5, 1, 1.5), [nx]);
  return [
    {
      name: 'npz, wavelengths',
      file: 'scan.npz',
      bytes: npzBytes({
        counts: npyBytes(up.values, up.shape, { type: 'i4' }),
        wavelength_nm: npyBytes(wavelengthsNm, [nk]),
      }),
    },
    {
      name: 'npz, energies, channels first, columns before rows',
      file: 'scan.npz',
      bytes: npzBytes({
        x_um: columns,
        counts: npyBytes(down.values, down.shape, { type: 'u2', endian: '>' }),
        energy_eV: npyBytes(axisIn(energiesEv, true), [nk], { isFortran: true }),
      }),
    },
    {
      name: 'npz, Raman shift',
      file: 'scan.npz',
      bytes: npzBytes({
        counts: npyBytes(up.values, up.shape, { type: 'i4' }),
        raman_shift_cm1: npyBytes(shiftsCm1, [nk]),
      }),
      choices: { laser },
    },
  ];
}

async function hdf5Variants(): Promise<Variant[]> {
  const { shape, values } = cubeIn({ order: 'yxk' });
  const counts = { kind: 'dataset', data: integers(values), shape } as const;
  const down = cubeIn({ order: 'kyx', isDescending: true });
  const nxdata = await hdf5Bytes({
    entry: {
      kind: 'group',
      attributes: { NX_class: 'NXentry' },
      children: {
        laser_energy: { kind: 'dataset', data: laserEv, attributes: { units: 'eV' } },
        data: {
          kind: 'group',
          attributes: { NX_class: 'NXdata', signal: 'intensity', axes: ['shift', '.', '.'] },
          children: {
            intensity: {
              kind: 'dataset',
              data: integers(down.values),
              shape: down.shape,
              chunks: [5, 2, 3],
              gzip: 4,
              shuffle: true,
            },
            shift: {
              kind: 'dataset',
              data: axisIn(shiftsCm1, true),
              attributes: { units: 'cm^-1' },
            },
          },
        },
      },
    },
  });
  return [
    {
      name: 'HDF5, bare arrays',
      file: 'scan.h5',
      bytes: await hdf5Bytes({
        scan: {
          kind: 'group',
          children: {
            counts: { ...counts, chunks: [2, 3, 7], gzip: 1 },
            wavelength: { kind: 'dataset', data: wavelengthsNm, attributes: { units: 'nm' } },
          },
        },
      }),
    },
    { name: 'HDF5, NXdata, descending shift, channels first', file: 'scan.nxs', bytes: nxdata },
    {
      name: 'HDF5, axis in micrometres',
      file: 'scan.h5',
      bytes: await hdf5Bytes({
        counts,
        lambda: {
          kind: 'dataset',
          data: wavelengthsNm.map((nm) => nm / 1000),
          attributes: { units: 'micrometers' },
        },
      }),
    },
    {
      name: 'HDF5, axis in milli-electronvolt',
      file: 'scan.h5',
      bytes: await hdf5Bytes({
        counts,
        energy: {
          kind: 'dataset',
          data: energiesEv.map((ev) => ev * 1000),
          attributes: { units: 'meV' },
        },
      }),
    },
  ];
}

function tiffVariants(): Variant[] {
  const { values } = cubeIn({ order: 'kyx' });
  const pages = Array.from({ length: nk }, (_, k) =>
    integers(values.subarray(k * ny * nx, (k + 1) * ny * nx)),
  );
  return [
    {
      name: 'TIFF, little-endian',
      file: 'scan.tif',
      bytes: tiffBytes(pages),
      companions: axisFile,
    },
    {
      name: 'TIFF, big-endian, 32-bit float, axis beside it as text',
      file: 'scan.tiff',
      bytes: tiffBytes(pages, { isLittle: false, isFloat: true }),
      companions: {
        'axis.csv': new TextEncoder().encode(`wavelength_nm\n${wavelengthsNm.join('\n')}\n`),
      },
    },
  ];
}

function textVariants(): Variant[] {
  const nm: ScanChoices = { axis: { kind: 'wavelength', unit: 'nm' } };
  const down = { order: 'yxk', isDescending: true } as const;
  const up = { order: 'yxk' } as const;
  return [
    {
      name: 'text, a row per pixel',
      file: 'scan.csv',
      bytes: rowsText(wavelengthsNm, up, ','),
      choices: nm,
    },
    {
      name: 'text, a row per pixel, descending, tabs',
      file: 'scan.tsv',
      bytes: rowsText(axisIn(wavelengthsNm, true), down, '\t'),
      choices: nm,
    },
    {
      name: 'text, a row per pixel, decimal commas and semicolons',
      file: 'scan.txt',
      bytes: rowsText(wavelengthsNm, up, ';', ','),
      choices: nm,
    },
    {
      name: 'text, long rows',
      file: 'scan.csv',
      bytes: longText(wavelengthsNm, 'wavelength_nm', up, ','),
      pitchNm: [500, 250],
    },
    {
      name: 'text, long rows of a descending shift',
      file: 'scan.dat',
      bytes: longText(axisIn(shiftsCm1, true), 'raman_shift_cm1', down, '\t'),
      choices: { laser },
    },
    {
      name: 'text, one spectrum',
      file: 'pixel.csv',
      bytes: spectrumText(wavelengthsNm, 'wavelength_nm,counts', ','),
      pixel,
    },
    {
      name: 'text, one spectrum without a header, between spaces',
      file: 'pixel.txt',
      bytes: spectrumText(wavelengthsNm, null, '  '),
      choices: nm,
      pixel,
    },
    { name: 'JCAMP-DX', file: 'pixel.jdx', bytes: jcampBytes(), pixel },
  ];
}

/** Written once for all tests that read them. */
export const variants: readonly Variant[] = [
  ...npyVariants(),
  ...npzVariants(),
  ...(await hdf5Variants()),
  ...tiffVariants(),
  ...textVariants(),
];
