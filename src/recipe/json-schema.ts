/** The recipe's schema as JSON Schema, for editors that check and explain a recipe while it is written. */
import * as z from 'zod';
import { recipeFormat, recipeSchema } from './schema';

export type JsonSchema = Readonly<Record<string, unknown>>;

/**
 * JSON Schema (draft 2020-12) of a recipe, the same every time. Descriptions give each field's
 * meaning, unit and default. Rules across fields and references between blocks are left to
 * `validateRecipe` where JSON Schema has no words for them: what it refuses, validation refuses too,
 * not always the other way round.
 */
export function recipeJsonSchema(): JsonSchema {
  const { $schema, ...rest } = z.toJSONSchema(recipeSchema, { target: 'draft-2020-12' });
  return {
    $schema,
    title: `Rimlight recipe, format ${recipeFormat}`,
    description:
      'How a hyperspectral scan is read, prepared, measured and shown. Paths are relative to the folder of the recipe; every block but "recipe" may be left out.',
    ...rest,
  };
}
