/** What a TIFF file says about itself: its description, its date, and the size of a pixel where a length is given. */
import type { Directory } from './directory';
import type { TiffBytes } from './fields';

const mostTextBytes = 4000;

const texts: readonly (readonly [tag: number, name: string])[] = [
  [270, 'ImageDescription'],
  [271, 'Make'],
  [272, 'Model'],
  [305, 'Software'],
  [306, 'DateTime'],
];

const resolutionTags = { x: 282, y: 283, unit: 296 } as const;

/** Resolutions of paper and screens, dots per inch, written by default (common practice, no source). */
const printDpi = [72, 90, 96, 100, 150, 180, 200, 240, 250, 300, 360, 400, 500, 600, 1200, 2400];

/** Facts of the first page. */
export async function readFacts(
  bytes: TiffBytes,
  { fields }: Directory,
): Promise<Readonly<Record<string, string | number>>> {
  const facts: Record<string, string | number> = {};
  for (const [tag, name] of texts) {
    const field = fields.get(tag);
    const text = field === undefined ? '' : await bytes.text(field, mostTextBytes);
    if (text !== '') facts[name] = text;
  }
  const value = async (tag: number): Promise<number> => {
    const field = fields.get(tag);
    return field === undefined ? Number.NaN : ((await bytes.numbers(field))[0] ?? Number.NaN);
  };
  const unitCode = await value(resolutionTags.unit);
  const described = /^unit=(.+)$/m.exec(String(facts.ImageDescription ?? ''))?.[1].trim();
  for (const along of ['x', 'y'] as const) {
    const size = pixelSize(await value(resolutionTags[along]), unitCode, described);
    if (size !== null) facts[`pixel_size_${along}`] = size;
  }
  return facts;
}

/** "0.015 um", from pixels per length; null where the length is unknown or the resolution is one for printing. */
function pixelSize(
  perUnit: number,
  unitCode: number,
  described: string | undefined,
): string | null {
  if (!(perUnit > 0) || !Number.isFinite(perUnit)) return null;
  // Some programs leave the unit code at "none" and name the unit in the description.
  if (unitCode === 1 && described !== undefined) {
    const unit = describedUnits[described.toLowerCase()];
    return unit === undefined ? null : `${rounded(1 / perUnit)} ${unit}`;
  }
  const micrometres = unitCode === 3 ? 10_000 / perUnit : 25_400 / perUnit;
  if (unitCode === 1) return null;
  const dpi = 25_400 / micrometres;
  if (printDpi.some((usual) => Math.abs(dpi - usual) < 0.01 * usual)) return null;
  return `${rounded(micrometres)} um`;
}

const describedUnits: Readonly<Record<string, string>> = {
  nm: 'nm',
  nanometer: 'nm',
  um: 'um',
  µm: 'um',
  μm: 'um',
  '\\u00b5m': 'um',
  micron: 'um',
  microns: 'um',
  micrometer: 'um',
  mm: 'mm',
  m: 'm',
};

/** The resolution is a fraction of two 32-bit numbers: more digits than this are its rounding. */
function rounded(value: number): number {
  return Number(value.toPrecision(7));
}
