/** One TIFF page: how its samples are stored, checked at the door. */
import type { ElementType } from '../container';
import { bytesOfType } from '../dtype';
import { scanError } from '../scan-error';
import { assertCompression } from './compression';
import type { Directory } from './directory';
import type { Field, TiffBytes } from './fields';

export interface Page {
  readonly width: number;
  readonly height: number;
  readonly samples: number;
  readonly type: ElementType;
  readonly compression: number;
  /** 1 none, 2 differences, 3 differences of floating-point bytes */
  readonly predictor: number;
  /** samples of a pixel lie side by side, or each in blocks of its own */
  readonly isPlanar: boolean;
  readonly blockWidth: number;
  /** rows of a strip or tile */
  readonly blockHeight: number;
  readonly isTiled: boolean;
  readonly offsets: Field;
  /** null where an old writer left them out */
  readonly byteCounts: Field | null;
  /** a smaller copy of another page, or a mask of it */
  readonly isAside: boolean;
  /** white is zero */
  readonly isInverted: boolean;
}

const tag = {
  newSubfileType: 254,
  width: 256,
  height: 257,
  bitsPerSample: 258,
  compression: 259,
  photometric: 262,
  stripOffsets: 273,
  samplesPerPixel: 277,
  rowsPerStrip: 278,
  stripByteCounts: 279,
  planarConfiguration: 284,
  predictor: 317,
  tileWidth: 322,
  tileLength: 323,
  tileOffsets: 324,
  tileByteCounts: 325,
  sampleFormat: 339,
} as const;

const mostLength = 2 ** 31;
const mostSamples = 65_535;

/** @throws RimlightError 'scan' - when something needed is missing, absurd, or cannot be read */
export async function readPage(
  bytes: TiffBytes,
  { fields }: Directory,
  where: string,
): Promise<Page> {
  const numbers = async (id: number): Promise<readonly number[]> => {
    const field = fields.get(id);
    return field === undefined ? [] : bytes.numbers(field);
  };
  const number = async (id: number, fallback: number): Promise<number> =>
    (await numbers(id))[0] ?? fallback;
  const length = async (id: number, name: string, fallback = Number.NaN): Promise<number> => {
    const value = await number(id, fallback);
    if (Number.isInteger(value) && value >= 1 && value < mostLength) return value;
    throw scanError(`its ${name} is ${Number.isNaN(value) ? 'missing' : value}`, where);
  };
  const width = await length(tag.width, 'width');
  const height = await length(tag.height, 'height');
  const samples = await length(tag.samplesPerPixel, 'number of samples', 1);
  if (samples > mostSamples) throw scanError(`it has ${samples} samples a pixel`, where);
  const photometric = await number(tag.photometric, 1);
  assertIntensities(photometric, where);
  const compression = await number(tag.compression, 1);
  assertCompression(compression, where);
  const type = elementTypeOf(
    await numbers(tag.bitsPerSample),
    await numbers(tag.sampleFormat),
    where,
  );
  const isTiled = fields.has(tag.tileOffsets);
  const offsets = fields.get(isTiled ? tag.tileOffsets : tag.stripOffsets);
  if (offsets === undefined) throw scanError('it does not say where its pixels lie', where);
  const rows = await number(tag.rowsPerStrip, height);
  const subfile = await number(tag.newSubfileType, 0);
  return {
    width,
    height,
    samples,
    type,
    compression,
    predictor: checkedPredictor(await number(tag.predictor, 1), type, where),
    isPlanar: samples > 1 && (await number(tag.planarConfiguration, 1)) === 2,
    blockWidth: isTiled ? await length(tag.tileWidth, 'tile width') : width,
    // "All rows in one strip" is written as 2^32 − 1.
    blockHeight: isTiled
      ? await length(tag.tileLength, 'tile length')
      : Math.min(height, Number.isInteger(rows) && rows >= 1 ? rows : height),
    isTiled,
    offsets,
    byteCounts: fields.get(isTiled ? tag.tileByteCounts : tag.stripByteCounts) ?? null,
    isAside: (subfile & 0b101) !== 0,
    isInverted: photometric === 0,
  };
}

function assertIntensities(photometric: number, where: string): void {
  const kind =
    photometric === 3
      ? 'places in a colour table'
      : photometric === 6 || photometric === 8 || photometric === 9
        ? 'colours of a picture'
        : null;
  if (kind === null) return;
  throw scanError(
    `its values are ${kind}, not intensities`,
    where,
    'Export the scan without colours.',
  );
}

function elementTypeOf(
  bits: readonly number[],
  formats: readonly number[],
  where: string,
): ElementType {
  const size = bits[0] ?? 1;
  const format = formats[0] ?? 1;
  if (bits.some((one) => one !== size) || formats.some((one) => one !== format)) {
    throw scanError(
      'its samples are of different types',
      where,
      'Export all channels in one type.',
    );
  }
  const name =
    format === 3 ? 'float' : format === 2 ? 'int' : format === 1 || format === 4 ? 'uint' : null;
  const type = elementTypes.find((one) => one === `${name}${size}`);
  if (type !== undefined) return type;
  const called =
    format === 5 || format === 6 ? 'complex numbers' : `${size}-bit ${name ?? 'unknown'} values`;
  throw scanError(
    `its samples are ${called}; 8, 16, 32 and 64-bit integers and 16, 32 and 64-bit floats can be read`,
    where,
    'Export the scan as 16-bit integers or 32-bit floats.',
  );
}

const elementTypes: readonly ElementType[] = [
  'uint8',
  'int8',
  'uint16',
  'int16',
  'uint32',
  'int32',
  'uint64',
  'int64',
  'float16',
  'float32',
  'float64',
];

function checkedPredictor(predictor: number, type: ElementType, where: string): number {
  const isKnown =
    predictor === 1 ||
    (predictor === 2 && !type.startsWith('float')) ||
    (predictor === 3 && type.startsWith('float'));
  if (isKnown) return predictor;
  throw scanError(`predictor ${predictor} does not go with ${type} samples`, where);
}

/** Bytes of the page's samples when unpacked. */
export function pageBytes({ width, height, samples, type }: Page): number {
  return width * height * samples * bytesOfType[type];
}
