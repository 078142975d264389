/** The recipe's `condition` block: the steps that prepare the counts, in the order they are applied. */
import * as z from 'zod';
import { defaults } from './default-values';
import {
  countSchema,
  energyUnits,
  fileSchema,
  indexPairSchema,
  objectToEmptyInterval,
  objectToMoreThanOne,
  pairSchema,
  positiveSchema,
  withRule,
} from './schema-parts';

const off = z
  .boolean()
  .describe('true keeps the step in the recipe but skips it; default false')
  .exactOptional();

const despikeSchema = z.strictObject({
  step: z.literal('despike').describe('replaces channels hit by cosmic rays'),
  off,
  method: z
    .enum(['spectral', 'neighbour'])
    .describe(
      `what a channel is compared with: its own spectrum, or the same channel of the pixels around; default "${defaults.despike.method}"`,
    )
    .exactOptional(),
  threshold: positiveSchema
    .describe(`how far above the rest a spike stands, in σ; default ${defaults.despike.threshold}`)
    .exactOptional(),
});

const offsetSchema = withRule(
  z.strictObject({
    step: z.literal('offset').describe('subtracts what the detector shows without light'),
    off,
    counts: z.number().describe('the same offset for every channel, counts').exactOptional(),
    file: fileSchema
      .describe('dark spectrum, or dark cube of the size of the scan, counts')
      .exactOptional(),
  }),
  (step, object) => {
    objectToMoreThanOne(step, ['counts', 'file'], object);
    if (step.counts === undefined && step.file === undefined) {
      object(['counts'], 'a number of counts, or a "file" instead');
    }
  },
).meta({ oneOf: [{ required: ['counts'] }, { required: ['file'] }] });

const responseSchema = z.strictObject({
  step: z.literal('response').describe('divides by the response of detector and optics'),
  off,
  file: fileSchema.describe('the curve: axis value, response (percent or fraction)'),
});

const calibrateSchema = withRule(
  z.strictObject({
    step: z.literal('calibrate').describe('corrects the axis by lines whose place is known'),
    off,
    points: z
      .array(z.tuple([z.number(), z.number()], { error: 'a pair [measured, true]' }))
      .min(1)
      .describe('pairs [measured, true], in "unit"'),
    degree: z
      .int()
      .min(0)
      .max(5)
      .describe(
        `degree of the polynomial measured → true, 0 for a shift; default ${defaults.calibrate.degree}`,
      )
      .exactOptional(),
    unit: z.enum(['nm', 'cm-1']).describe('unit of the points; cm-1 is a Raman shift'),
  }),
  (step, object) => {
    const { points, degree } = step;
    if (!Array.isArray(points)) return;
    const wanted = typeof degree === 'number' ? degree : defaults.calibrate.degree;
    if (points.length > 0 && points.length <= wanted) {
      object(['points'], `at least ${wanted + 1} points for degree ${wanted}`);
    }
    const seen = new Set<unknown>();
    for (const [index, point] of points.entries()) {
      const measured: unknown = Array.isArray(point) ? point[0] : undefined;
      if (typeof measured === 'number' && seen.has(measured)) {
        object(['points', index, 0], 'a measured value that no other point has');
      }
      seen.add(measured);
    }
  },
);

const farfieldSchema = withRule(
  z.strictObject({
    step: z.literal('farfield').describe('subtracts the signal recorded with the tip away'),
    off,
    file: fileSchema.describe('spectrum or cube recorded with the tip away'),
    scale: z
      .union([z.number().min(0), z.literal('fit')], { error: 'a number of at least 0, or "fit"' })
      .describe(
        `factor it is subtracted with, or "fit": found from the counts in "window"; default ${defaults.farfield.scale}`,
      )
      .exactOptional(),
    window: pairSchema
      .describe('energies between which only far field is seen, eV; needed for "fit"')
      .exactOptional(),
  }),
  (step, object) => {
    objectToEmptyWindow(step.window, (expected) => object(['window'], expected));
    if (step.scale === 'fit' && step.window === undefined) {
      object(['window'], 'two energies in eV, since the scale is "fit"');
    }
  },
);

const baselineStep = z.literal('baseline').describe('subtracts a smooth background');

const smoothness = positiveSchema
  .describe(
    `weight of smoothness against closeness, more is stiffer; default ${defaults.baseline.smoothness}`,
  )
  .exactOptional();

const iterations = z
  .int()
  .min(1)
  .max(1000)
  .describe(`most rounds of reweighting; default ${defaults.baseline.iterations}`)
  .exactOptional();

const baselineSchema = z.discriminatedUnion('method', [
  z.strictObject({
    step: baselineStep,
    off,
    method: z.literal('arpls').describe('asymmetrically reweighted penalised least squares'),
    smoothness,
    iterations,
  }),
  z.strictObject({
    step: baselineStep,
    off,
    method: z.literal('asls').describe('asymmetric least squares'),
    smoothness,
    asymmetry: z
      .number()
      .gt(0)
      .lt(1)
      .describe(
        `weight of channels above the baseline, those below have the rest; default ${defaults.baseline.asymmetry}`,
      )
      .exactOptional(),
    iterations,
  }),
  z.strictObject({
    step: baselineStep,
    off,
    method: z.literal('snip').describe('statistics-sensitive non-linear iterative peak clipping'),
    half_width: countSchema
      .describe(
        `half the width of the widest peak clipped, channels; default ${defaults.baseline.half_width}`,
      )
      .exactOptional(),
  }),
  withRule(
    z.strictObject({
      step: baselineStep,
      off,
      method: z.literal('polynomial').describe('a polynomial through what is no peak'),
      degree: z
        .int()
        .min(0)
        .max(12)
        .describe(`degree of the polynomial; default ${defaults.baseline.degree}`)
        .exactOptional(),
      windows: z
        .array(pairSchema)
        .min(1)
        .describe('energy intervals without peaks, eV; left out: found by repeated clipping')
        .exactOptional(),
    }),
    (step, object) => {
      if (!Array.isArray(step.windows)) return;
      for (const [index, window] of step.windows.entries()) {
        objectToEmptyWindow(window, (expected) => object(['windows', index], expected));
      }
    },
  ),
]);

const denoiseSchema = z.strictObject({
  step: z.literal('denoise').describe('keeps the strongest components of the whole cube'),
  off,
  method: z.literal('svd').describe('singular value decomposition of counts over their noise'),
  rank: z
    .union([countSchema, z.literal('auto')], { error: 'a whole number of at least 1, or "auto"' })
    .describe(
      `components kept, or "auto": as many as stand above the noise; default "${defaults.denoise.rank}"`,
    )
    .exactOptional(),
});

const alignRowsSchema = z.strictObject({
  step: z.literal('align-rows').describe('moves rows sideways so that neighbours match'),
  off,
  max_shift_px: positiveSchema
    .describe(`farthest a row is moved, pixels; default ${defaults.alignRows.max_shift_px}`)
    .exactOptional(),
});

const cropSchema = withRule(
  z.strictObject({
    step: z.literal('crop').describe('keeps a part of the scan'),
    off,
    axis: pairSchema
      .describe('axis range, in "unit"; channels whose centre lies inside are kept')
      .exactOptional(),
    unit: z
      .enum(energyUnits)
      .describe(`unit of "axis"; default "${defaults.crop.unit}"`)
      .exactOptional(),
    x: indexPairSchema.describe('first and last column kept, from 0').exactOptional(),
    y: indexPairSchema.describe('first and last row kept, from 0').exactOptional(),
  }),
  (step, object) => {
    objectToEmptyWindow(step.axis, (expected) => object(['axis'], expected));
    if (['axis', 'x', 'y'].every((field) => step[field] === undefined)) {
      object(['axis'], 'at least one of "axis", "x" and "y"');
    }
  },
).meta({ anyOf: [{ required: ['axis'] }, { required: ['x'] }, { required: ['y'] }] });

const binSchema = withRule(
  z.strictObject({
    step: z.literal('bin').describe('sums neighbours; a remainder at the far edge is dropped'),
    off,
    x: countSchema.describe(`columns summed into one; default ${defaults.bin.x}`).exactOptional(),
    y: countSchema.describe(`rows summed into one; default ${defaults.bin.y}`).exactOptional(),
    k: countSchema.describe(`channels summed into one; default ${defaults.bin.k}`).exactOptional(),
  }),
  (step, object) => {
    if (['x', 'y', 'k'].every((field) => step[field] === undefined)) {
      object(['k'], 'at least one of "x", "y" and "k"');
    }
  },
).meta({ anyOf: [{ required: ['x'] }, { required: ['y'] }, { required: ['k'] }] });

export const conditionStepSchema = z.discriminatedUnion('step', [
  despikeSchema,
  offsetSchema,
  responseSchema,
  calibrateSchema,
  farfieldSchema,
  baselineSchema,
  denoiseSchema,
  alignRowsSchema,
  cropSchema,
  binSchema,
]);

export const conditionBlockSchema = z.array(conditionStepSchema);

function objectToEmptyWindow(window: unknown, object: (expected: string) => void): void {
  if (!Array.isArray(window)) return;
  objectToEmptyInterval(window[0], window[1], () => object('two different values'));
}
