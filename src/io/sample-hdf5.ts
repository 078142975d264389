/** A demo scan as an HDF5 tree in the NeXus manner (NXroot, NXentry, NXdata with signal and axes). */
import type { SampleScan } from '../science/scenarios/scenario';
import type { Hdf5Dataset, Hdf5Group } from './write/hdf5';

/** Columns of a chunk: with the usual thousand channels about 128 kB, so that a few rows are read without the rest. */
const CHUNK_COLUMNS = 64;

/** Groups and datasets of the file; README.md in sample-data lists them. */
export function sampleTree(scan: SampleScan): Hdf5Group {
  return group(
    { NX_class: 'NXroot', default: 'entry' },
    {
      entry: group(
        { NX_class: 'NXentry', default: 'scan' },
        {
          title: dataset(`${scan.name}, an invented demo scan, seed ${scan.seed}`),
          scan: scanGroup(scan),
          laser_wavelength: dataset(scan.laserNm, { units: 'nm', medium: 'air' }),
          exposure_time: dataset(scan.exposureS, { units: 's' }),
          detector: group(
            { NX_class: 'NXdetector' },
            {
              dark_counts: dataset(scan.darkCounts, {
                units: 'counts',
                long_name: 'counts without light',
              }),
              response: dataset(scan.response, {
                units: '1',
                long_name: 'counts per photon that reaches the detector',
              }),
            },
          ),
        },
      ),
    },
  );
}

function scanGroup(scan: SampleScan): Hdf5Group {
  const { ny, nx, nk } = scan.shape;
  const positions = (count: number) =>
    Float64Array.from({ length: count }, (_, i) => i * scan.pitchNm);
  return group(
    { NX_class: 'NXdata', signal: 'counts', axes: ['y', 'x', 'wavelength'] },
    {
      counts: {
        kind: 'dataset',
        data: scan.counts,
        shape: [ny, nx, nk],
        attributes: { units: 'counts', long_name: 'detector counts' },
        chunks: [1, Math.min(nx, CHUNK_COLUMNS), nk],
        gzip: 6,
        shuffle: true,
      },
      wavelength: dataset(scan.wavelengthAirNm, {
        units: 'nm',
        medium: 'air',
        long_name: 'wavelength in air',
      }),
      x: dataset(positions(nx), { units: 'nm' }),
      y: dataset(positions(ny), { units: 'nm' }),
      height: {
        ...dataset(Float32Array.from(scan.heightNm), {
          units: 'nm',
          long_name: 'height of the surface',
        }),
        shape: [ny, nx],
      },
    },
  );
}

function group(attributes: Hdf5Group['attributes'], children: Hdf5Group['children']): Hdf5Group {
  return { kind: 'group', attributes: attributes ?? {}, children };
}

function dataset(
  data: Hdf5Dataset['data'],
  attributes: Hdf5Dataset['attributes'] = {},
): Hdf5Dataset {
  return { kind: 'dataset', data, attributes };
}
