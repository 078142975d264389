/** The recipe's `model` block: what every pixel's spectrum is fitted with. */
import * as z from 'zod';
import { defaults } from './default-values';
import { centreSpec, mixSpec, plainSpec, widthSpec } from './parameter-spec';
import { nameSchema, objectToEmptyInterval, pairSchema, withRule } from './schema-parts';

const common = {
  name: nameSchema.describe(
    "name of the component, the COMPONENT of its maps fit.COMPONENT.PARAM; no other component's, whether in capitals or not",
  ),
  role: z
    .enum(['exciton', 'trion', 'localised', 'interlayer', 'raman'])
    .describe('what the component stands for; "raman" also reports its centre as a shift')
    .exactOptional(),
};

const optional = z
  .boolean()
  .describe(
    'true: kept at a pixel only where the Bayesian information criterion asks for it; default false',
  )
  .exactOptional();

const area = plainSpec('counts under the peak').exactOptional();
const centre = centreSpec('centre of the peak').exactOptional();
const fwhm = widthSpec('full width at half maximum').exactOptional();
const level = plainSpec('level at the middle of the window, counts per channel').exactOptional();

const gaussian = z.strictObject({
  ...common,
  shape: z.literal('gaussian').describe('Gaussian peak'),
  area,
  centre,
  fwhm,
  optional,
});

const lorentzian = z.strictObject({
  ...common,
  shape: z.literal('lorentzian').describe('Lorentzian peak'),
  area,
  centre,
  fwhm,
  optional,
});

const pseudoVoigt = z.strictObject({
  ...common,
  shape: z.literal('pseudo-voigt').describe('sum of a Lorentzian and a Gaussian of one width'),
  area,
  centre,
  fwhm,
  eta: mixSpec('share of the Lorentzian, 0 to 1').exactOptional(),
  optional,
});

const voigt = withRule(
  z.strictObject({
    ...common,
    shape: z.literal('voigt').describe('convolution of a Gaussian and a Lorentzian'),
    area,
    centre,
    fwhm: widthSpec(
      'full width at half maximum of the whole, as a start shared out between the two; not beside fwhm_g or fwhm_l',
    ).exactOptional(),
    fwhm_g: widthSpec('full width at half maximum of the Gaussian').exactOptional(),
    fwhm_l: widthSpec('full width at half maximum of the Lorentzian').exactOptional(),
    optional,
  }),
  (component, object) => {
    const { fwhm: whole, fwhm_g, fwhm_l } = component;
    if (whole === undefined || (fwhm_g === undefined && fwhm_l === undefined)) return;
    object(['fwhm'], 'either "fwhm", or "fwhm_g" and "fwhm_l"');
  },
).meta({
  not: { required: ['fwhm'], anyOf: [{ required: ['fwhm_g'] }, { required: ['fwhm_l'] }] },
});

const tailed = z.strictObject({
  ...common,
  shape: z
    .literal('tailed')
    .describe('Gaussian convolved with a one-sided exponential toward low energy'),
  area,
  centre,
  fwhm: widthSpec('full width at half maximum of the Gaussian').exactOptional(),
  tail: widthSpec('energy over which the exponential falls by e').exactOptional(),
  optional,
});

const fano = z.strictObject({
  ...common,
  shape: z.literal('fano').describe('asymmetric line of a resonance on a continuum'),
  area,
  centre,
  fwhm,
  q: plainSpec('asymmetry of the line, negative or positive').exactOptional(),
  optional,
});

const flat = z.strictObject({
  ...common,
  shape: z.literal('flat').describe('the same counts in every channel'),
  level: plainSpec('counts per channel').exactOptional(),
  optional,
});

const line = z.strictObject({
  ...common,
  shape: z.literal('line').describe('straight line'),
  level,
  slope: plainSpec('counts per channel per eV').exactOptional(),
  optional,
});

const parabola = z.strictObject({
  ...common,
  shape: z.literal('parabola').describe('parabola'),
  level,
  slope: plainSpec('slope at the middle of the window, counts per channel per eV').exactOptional(),
  curvature: plainSpec('counts per channel per eV², the factor of the square').exactOptional(),
  optional,
});

const decay = z.strictObject({
  ...common,
  shape: z.literal('decay').describe('falling exponential'),
  level,
  decay: plainSpec(
    'energy over which it falls by e, eV; negative: it falls toward low energy',
  ).exactOptional(),
  optional,
});

export const componentSchema = z.discriminatedUnion('shape', [
  gaussian,
  lorentzian,
  pseudoVoigt,
  voigt,
  tailed,
  fano,
  flat,
  line,
  parabola,
  decay,
]);

/** Far more than a fit can tell apart; bounds what validation compares. */
export const mostComponents = 100;

export const modelBlockSchema = withRule(
  z.strictObject({
    window: pairSchema
      .describe('energies between which is fitted, eV; left out: the whole axis')
      .exactOptional(),
    noise: z
      .enum(['poisson', 'gaussian', 'uniform'])
      .describe(
        'poisson: counts; gaussian: variances from scan.detector; uniform: every channel alike; default "poisson" for whole-number counts, "gaussian" with a detector block, otherwise "uniform"',
      )
      .exactOptional(),
    seed: z
      .enum(['neighbour', 'start'])
      .describe(
        `where a pixel's fit begins: at the result of a pixel beside it, or at the starts given; default "${defaults.model.seed}"`,
      )
      .exactOptional(),
    components: z
      .array(componentSchema)
      .min(1)
      .max(mostComponents)
      .describe('peaks and what they stand on'),
  }),
  (model, object) => {
    if (!Array.isArray(model.window)) return;
    const [from, to] = model.window;
    objectToEmptyInterval(from, to, () => object(['window'], 'two different values'));
  },
);
