/** The recipe's `scan` block: how the file is to be read; whatever is left out is guessed. */
import * as z from 'zod';
import { axisUnits } from '../science/axis';
import { defaults } from './default-values';
import {
  fileSchema,
  type LooseRecord,
  notNegativeSchema,
  type Objection,
  objectToEmptyInterval,
  objectToMoreThanOne,
  placeSchema,
  positiveSchema,
  quoted,
  withRule,
} from './schema-parts';

const orders = [
  ...['yxk', 'ykx', 'xyk', 'xky', 'kyx', 'kxy'],
  ...['yk', 'ky', 'xk', 'kx', 'k'],
] as const;

export const lengthUnits = ['nm', 'um', 'mm', 'm', 'angstrom'] as const;

const axisSchema = withRule(
  z.strictObject({
    data: placeSchema
      .describe('HDF5 path or npz member of the axis values, inside the scan file')
      .exactOptional(),
    values: z
      .array(z.number())
      .min(2)
      .describe('the axis values themselves, one for each channel as recorded')
      .exactOptional(),
    file: fileSchema
      .describe('file of the axis values (npy or text), beside the recipe')
      .exactOptional(),
    from: z.number().describe('first value of a uniform axis; needs "to"').exactOptional(),
    to: z.number().describe('last value of a uniform axis; needs "from"').exactOptional(),
    kind: z
      .enum(['wavelength', 'energy', 'shift'])
      .describe('what the axis values are; a Raman "shift" needs the laser')
      .exactOptional(),
    unit: z
      .enum(['nm', 'um', 'angstrom', 'eV', 'meV', 'cm-1'])
      .describe(
        'nm, um or angstrom for a wavelength; eV, meV or cm-1 (absolute) for an energy; cm-1 for a shift',
      )
      .exactOptional(),
    medium: z
      .enum(['air', 'vacuum'])
      .describe(
        `medium the wavelengths are given in, for the axis, the laser and bands in nm alike; default "${defaults.scan.medium}"`,
      )
      .exactOptional(),
  }),
  (axis, object) => {
    const isUniform = axis.from !== undefined || axis.to !== undefined;
    objectToMoreThanOne(axis, ['data', 'values', 'file'], object);
    const source = ['data', 'values', 'file'].find((field) => axis[field] !== undefined);
    if (isUniform && source !== undefined) {
      const given = axis.from === undefined ? 'to' : 'from';
      object([given], `only one source of axis values; "${source}" is given too`);
    }
    if (isUniform && axis.from === undefined) object(['from'], 'the first axis value beside "to"');
    if (isUniform && axis.to === undefined) object(['to'], 'the last axis value beside "from"');
    objectToEmptyInterval(axis.from, axis.to, () => object(['to'], 'a value other than "from"'));
    objectToUnfitAxisUnit(axis, object);
  },
).meta({ dependentRequired: { from: ['to'], to: ['from'] } });

function objectToUnfitAxisUnit(axis: LooseRecord, object: Objection): void {
  const { kind, unit } = axis;
  if (kind !== 'wavelength' && kind !== 'energy' && kind !== 'shift') return;
  const units: readonly string[] = axisUnits[kind];
  if (typeof unit === 'string' && !units.includes(unit)) {
    object(['unit'], `${quoted(units, 'or')} for an axis of kind "${kind}"`);
  }
}

/** Units that are wanted under another spelling; anything else is kept as a quantity that is no length. */
const lengthSpellings: Readonly<Record<string, string>> = {
  µm: 'um',
  μm: 'um',
  micron: 'um',
  microns: 'um',
  micrometer: 'um',
  micrometre: 'um',
  nanometer: 'nm',
  nanometre: 'nm',
  å: 'angstrom',
  pixel: 'px',
  pixels: 'px',
};

const pixelSchema = withRule(
  z.strictObject({
    x: z.number().describe('distance from one column to the next, in "unit"'),
    y: z.number().describe('distance from one row to the next, in "unit"'),
    unit: z
      .string()
      .min(1, { error: 'a unit, such as "nm"' })
      .max(40)
      .describe(
        'nm, um, mm, m or angstrom; px where nothing is known; any other unit (V) is kept and is no length',
      ),
  }),
  (pixel, object) => {
    const { unit } = pixel;
    if (typeof unit !== 'string') return;
    const known: readonly string[] = [...lengthUnits, 'px'];
    const lower = unit.toLowerCase();
    const meant = known.find((word) => word.toLowerCase() === lower) ?? lengthSpellings[lower];
    // "M" may be molar and "Nm" newton metres, but no step of a scan is either.
    if (meant !== undefined && meant !== unit) object(['unit'], `"${meant}"`, meant);
    const isLength = known.includes(unit);
    for (const field of ['x', 'y']) {
      const step = pixel[field];
      if (typeof step !== 'number') continue;
      if (isLength ? step <= 0 : step === 0) {
        object([field], isLength ? 'a number above 0' : 'a number other than 0');
      }
    }
  },
);

const laserSchema = z.strictObject({
  value: positiveSchema.describe('wavelength, photon energy or wavenumber of the laser, in "unit"'),
  unit: z
    .enum(['nm', 'eV', 'cm-1'])
    .describe('nm (in the medium of the axis), eV, or cm-1 (absolute)'),
});

const { detector } = defaults.scan;

const detectorSchema = z.strictObject({
  electrons_per_count: positiveSchema
    .describe(`electrons in one count; default ${detector.electrons_per_count}`)
    .exactOptional(),
  offset_counts: z
    .number()
    .describe(`counts a channel shows without light; default ${detector.offset_counts}`)
    .exactOptional(),
  read_noise_e: notNegativeSchema
    .describe(`read noise, electrons (1 σ) per channel; default ${detector.read_noise_e}`)
    .exactOptional(),
  excess_noise: z
    .number()
    .min(1)
    .describe(
      `excess noise factor F, √2 for a high electron-multiplying gain; default ${detector.excess_noise}`,
    )
    .exactOptional(),
});

const heightSchema = withRule(
  z.strictObject({
    data: placeSchema.describe('HDF5 path or npz member of the height map').exactOptional(),
    file: fileSchema.describe('file of the height map, beside the recipe').exactOptional(),
    unit: z
      .enum(lengthUnits)
      .describe(`unit of the heights; default "${defaults.scan.height.unit}"`)
      .exactOptional(),
    shift_px: z
      .tuple([z.number(), z.number()], { error: 'a list of two numbers, [x, y]' })
      .describe('how far the height map lies from the counts, pixels, [x, y]; default [0, 0]')
      .exactOptional(),
  }),
  (height, object) => objectToMoreThanOne(height, ['data', 'file'], object),
);

export const scanBlockSchema = z.strictObject({
  data: placeSchema
    .describe('HDF5 path or npz member of the cube; left out: found')
    .exactOptional(),
  order: z
    .enum(orders)
    .describe(
      'axes of the cube in the order of the file: y (rows), x (columns), k (channels); left out: found',
    )
    .exactOptional(),
  axis: axisSchema
    .describe('the spectral axis: where its values are and what they mean')
    .exactOptional(),
  pixel: pixelSchema.describe('steps of the scan').exactOptional(),
  laser: laserSchema.describe('excitation, needed for Raman shifts').exactOptional(),
  serpentine: z
    .boolean()
    .describe(`true: odd rows were recorded right to left; default ${defaults.scan.serpentine}`)
    .exactOptional(),
  exposure_s: positiveSchema.describe('exposure of one pixel, s').exactOptional(),
  detector: detectorSchema
    .describe(
      'gain and noise; without this block whole-number counts are taken as Poisson counts, and other data have no noise model',
    )
    .exactOptional(),
  height: heightSchema.describe('the height map of the same area').exactOptional(),
});
