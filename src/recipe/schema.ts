/**
 * The recipe, format 1: the one document a result is made from, together with a scan. Each block has
 * its own file; nothing is filled in here, so a recipe is kept as it was written (`defaults.ts` says
 * what a field left out means). References between blocks are the business of `references.ts`.
 */
import * as z from 'zod';
import { bandBlockSchema } from './band-block';
import { blendBlockSchema } from './blend-block';
import { conditionBlockSchema } from './condition-block';
import { featureBlockSchema } from './feature-block';
import { modelBlockSchema } from './model-block';
import { pinBlockSchema } from './pin-block';
import { regionBlockSchema } from './region-block';
import { scanBlockSchema } from './scan-block';
import { type DeepReadonly, textSchema } from './schema-parts';
import { strainBlockSchema } from './strain-block';

/** Raised when a document of this build cannot be read by an older one. */
export const recipeFormat = 1;

/** The order of the fields is the order in which a recipe is written. */
export const recipeSchema = z.strictObject({
  $schema: textSchema
    .describe('where an editor finds the JSON Schema of this document; not read by the program')
    .exactOptional(),
  recipe: z.literal(recipeFormat).describe('format of this document'),
  title: textSchema.describe('what the recipe is for, in words').exactOptional(),
  scan: scanBlockSchema
    .describe('how the scan file is read; whatever is left out is guessed')
    .exactOptional(),
  condition: conditionBlockSchema
    .describe('steps that prepare the counts, applied in order')
    .exactOptional(),
  bands: bandBlockSchema.describe('named intervals of photon energy').exactOptional(),
  model: modelBlockSchema.describe("what every pixel's spectrum is fitted with").exactOptional(),
  blend: blendBlockSchema.describe('maps mixed into one false-colour picture').exactOptional(),
  pins: pinBlockSchema.describe('marked pixels').exactOptional(),
  regions: regionBlockSchema.describe('named sets of pixels').exactOptional(),
  strain: strainBlockSchema.describe('strain maps, three independent ways').exactOptional(),
  features: featureBlockSchema.describe('features found on a map').exactOptional(),
});

export type Recipe = DeepReadonly<z.infer<typeof recipeSchema>>;

export type ScanBlock = NonNullable<Recipe['scan']>;
export type ConditionStep = NonNullable<Recipe['condition']>[number];
export type StepName = ConditionStep['step'];
export type RecipeBand = NonNullable<Recipe['bands']>[number];
export type PeakModel = NonNullable<Recipe['model']>;
export type ModelComponent = PeakModel['components'][number];
export type Blend = NonNullable<Recipe['blend']>;
export type BlendChannel = Blend['channels'][number];
export type BlendMode = Blend['mode'];
/** A limit of a blend channel: a number in the map's unit, or a percentile of the map. */
export type BlendLimit = NonNullable<BlendChannel['low']>;
export type Pin = NonNullable<Recipe['pins']>[number];
export type Region = NonNullable<Recipe['regions']>[number];
export type Strain = NonNullable<Recipe['strain']>;
export type Features = NonNullable<Recipe['features']>;

type CentredPeak = Extract<ModelComponent, { readonly shape: 'gaussian' }>;
/** How a parameter is given: a number is its start. */
export type ParameterSpec = NonNullable<CentredPeak['centre']>;
