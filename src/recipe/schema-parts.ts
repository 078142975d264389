/** The pieces the blocks of the recipe's schema are made of. */
import * as z from 'zod';

// Without this the validator compiles itself by `new Function`, which the app's Content-Security-Policy forbids.
z.config({ jitless: true });

/** A type whose every field and list is read-only: a recipe is never changed in place. */
export type DeepReadonly<T> = T extends object
  ? { readonly [K in keyof T]: DeepReadonly<T[K]> }
  : T;

export type LooseRecord = Readonly<Record<string, unknown>>;

export function isRecord(value: unknown): value is LooseRecord {
  return typeof value === 'object' && value !== null && !Array.isArray(value);
}

/** Tells one problem of a rule: the field, relative to the rule's object, what was expected of it, and the word meant. */
export type Objection = (
  path: readonly (string | number)[],
  expected: string,
  nearest?: string,
) => void;

/**
 * A rule across the fields of one object. It is asked even when fields of the object are wrong or
 * missing, so that every problem is told at once; it therefore sees plain values and must look
 * before it compares.
 */
export function withRule<T extends z.ZodType>(
  schema: T,
  rule: (value: LooseRecord, object: Objection) => void,
): T {
  return schema.superRefine(
    (value: unknown, context) => {
      if (!isRecord(value)) return;
      rule(value, (path, expected, nearest) => {
        const params = { nearest };
        context.addIssue({ code: 'custom', path: [...path], message: expected, params });
      });
    },
    { when: ({ value }) => isRecord(value) },
  );
}

/** Names of bands, components and regions: they become parts of map names and of file names. */
export const nameSchema = z.string().regex(/^[A-Za-z0-9_-]{1,64}$/, {
  error: 'a name of 1 to 64 letters (a to z), digits, "_" or "-", without dots or spaces',
});

export const textSchema = z.string().max(1000);

/** A path or a name inside a file: any text but the empty one. */
export const placeSchema = z.string().min(1, { error: 'a path or name, not empty text' }).max(1000);

export const fileSchema = placeSchema;

export const numberSchema = z.number();
export const positiveSchema = z.number().gt(0);
export const notNegativeSchema = z.number().min(0);
export const countSchema = z.int().min(1).max(1e9);
export const indexSchema = z.int().min(0).max(1e9);

/** Two numbers; nothing is said of their order. */
export const pairSchema = z.tuple([z.number(), z.number()], { error: 'a list of two numbers' });
export const indexPairSchema = z.tuple([indexSchema, indexSchema], {
  error: 'a list of two pixel indices',
});

export const colourSchema = z
  .string()
  .regex(/^#[0-9a-fA-F]{6}$/, { error: 'a colour as "#rrggbb"' });

export const mapNameSchema = placeSchema;

/** Units photon energies are written in: eV, meV, nm in the scan's own medium, cm⁻¹ of Raman shift. */
export const energyUnits = ['eV', 'meV', 'nm', 'cm-1'] as const;
export type EnergyUnit = (typeof energyUnits)[number];

/** The ends of an interval must differ; either order is accepted. */
export function objectToEmptyInterval(from: unknown, to: unknown, object: () => void): void {
  if (typeof from === 'number' && from === to) object();
}

/** At least two of `fields` given is a contradiction; told at each but the first. */
export function objectToMoreThanOne(
  value: LooseRecord,
  fields: readonly string[],
  object: Objection,
): void {
  const [first, ...rest] = fields.filter((field) => value[field] !== undefined);
  for (const field of rest)
    object([field], `only one of ${quoted(fields, 'and')}; "${first}" is given too`);
}

/** `"a", "b" or "c"`; of a long list the first twenty. */
export function quoted(words: readonly unknown[], joint: 'or' | 'and'): string {
  const shown = words
    .slice(0, 20)
    .map((word) => (typeof word === 'string' ? `"${word}"` : String(word)));
  if (words.length > shown.length) shown.push(`${words.length - shown.length} more`);
  const last = shown.pop() ?? '';
  return shown.length === 0 ? last : `${shown.join(', ')} ${joint} ${last}`;
}
