/** A demo scan as the files the command line writes: the scan, what its format cannot hold, and the truth. */
import { RimlightError } from '../errors';
import type { SampleScan } from '../science/scenarios/scenario';
import type { ReadOptions } from './container';
import { sampleTree } from './sample-hdf5';
import { sampleTruthJson } from './sample-truth';
import { writeHdf5 } from './write/hdf5';
import { encodeNpy } from './write/npy';
import { encodeNpz } from './write/npz';

export interface NamedBytes {
  /** file name without folder */
  readonly name: string;
  readonly bytes: Uint8Array;
}

type Encode = (
  scan: SampleScan,
  name: { readonly fileName: string; readonly stem: string },
  options: ReadOptions,
) => Promise<readonly NamedBytes[]>;

/** By ending; each gives the scan file first. */
const encoders: Readonly<Record<string, Encode>> = {
  '.h5': async (scan, { fileName }, options) => [
    { name: fileName, bytes: await writeHdf5(sampleTree(scan), options) },
  ],
  '.npz': async (scan, { fileName }) => [
    {
      name: fileName,
      bytes: encodeNpz({
        counts: encodeCounts(scan),
        ...sampleVectors(scan),
        x_nm: positions(scan, scan.shape.nx),
        y_nm: positions(scan, scan.shape.ny),
        laser_wavelength_nm: encodeNpy(Float64Array.of(scan.laserNm), []),
        exposure_s: encodeNpy(Float64Array.of(scan.exposureS), []),
      }),
    },
  ],
  // one array and nothing else: the rest goes into files beside it, and pitch and laser into a recipe
  '.npy': async (scan, { fileName, stem }) => [
    { name: fileName, bytes: encodeCounts(scan) },
    ...Object.entries(sampleVectors(scan)).map(([name, bytes]) => ({
      name: `${stem}.${name}.npy`,
      bytes,
    })),
  ],
};

function encodeCounts({ counts, shape }: SampleScan): Uint8Array {
  return encodeNpy(counts, [shape.ny, shape.nx, shape.nk]);
}

/** What belongs to the counts, each a .npy file; the unit is in the name. */
function sampleVectors(scan: SampleScan): Readonly<Record<string, Uint8Array>> {
  const { ny, nx, nk } = scan.shape;
  return {
    wavelength_air_nm: encodeNpy(scan.wavelengthAirNm, [nk]),
    height_nm: encodeNpy(Float32Array.from(scan.heightNm), [ny, nx]),
    dark_counts: encodeNpy(scan.darkCounts, [nk]),
    response: encodeNpy(scan.response, [nk]),
  };
}

function positions({ pitchNm }: SampleScan, count: number): Uint8Array {
  return encodeNpy(
    Float64Array.from({ length: count }, (_, i) => i * pitchNm),
    [count],
  );
}

/** Endings a demo scan can be written with. */
export const sampleExtensions: readonly string[] = Object.keys(encoders);

/**
 * The files of a demo scan: the scan itself, companions with what the format cannot hold, and last STEM.truth.json.
 *
 * @param fileName - of the scan, without folder; its ending chooses the format
 * @throws RimlightError 'usage' - for another ending; 'cancelled' - when stopped
 */
export async function encodeSample(
  scan: SampleScan,
  fileName: string,
  options: ReadOptions = {},
): Promise<readonly NamedBytes[]> {
  const { extension, stem } = sampleFormat(fileName);
  const files = await encoders[extension](scan, { fileName, stem }, options);
  const truth = new TextEncoder().encode(sampleTruthJson(scan));
  return [...files, { name: `${stem}.truth.json`, bytes: truth }];
}

/**
 * Ending and stem of a demo scan's file name, to be checked before the scan is made.
 *
 * @throws RimlightError 'usage' - when the ending is no format a demo scan can be written in
 */
export function sampleFormat(fileName: string): {
  readonly extension: string;
  readonly stem: string;
} {
  const extension = sampleExtensions.find((ending) => fileName.toLowerCase().endsWith(ending));
  const stem = extension === undefined ? '' : fileName.slice(0, -extension.length);
  if (extension !== undefined && stem !== '') return { extension, stem };
  throw new RimlightError('usage', {
    what: `a demo scan cannot be written as "${fileName}"`,
    where: '',
    hint: `Give a name that ends in ${sampleExtensions.join(' or ')}.`,
  });
}
