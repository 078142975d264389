/**
 * The schema beside a value: which fields an object may have, in the order they are written, and
 * which schema a field's value falls under. Unions are resolved by their discriminating word.
 */
import * as z from 'zod';
import { isRecord } from './schema-parts';

type AnySchema = z.core.$ZodType;

/** Without `exactOptional` around it. */
function bare(schema: AnySchema): AnySchema {
  return schema instanceof z.ZodExactOptional ? bare(schema.unwrap()) : schema;
}

/** The objects `value` could be meant as: one for a plain object or a resolved union, several for an open one. */
function objectsFor(schema: AnySchema, value: unknown): readonly z.ZodObject[] {
  const inner = bare(schema);
  if (inner instanceof z.ZodObject) return [inner];
  if (!(inner instanceof z.ZodUnion)) return [];
  const all = inner.options.flatMap((option) => objectsFor(option, value));
  if (!(inner instanceof z.ZodDiscriminatedUnion) || !isRecord(value)) return all;
  const { discriminator } = inner.def;
  const fitting = all.filter((object) => allows(object.shape[discriminator], value[discriminator]));
  return fitting.length > 0 ? fitting : all;
}

function allows(literal: AnySchema | undefined, word: unknown): boolean {
  return literal instanceof z.ZodLiteral && literal.def.values.some((value) => value === word);
}

/** Fields `value` may have under `schema`, in the order they are written; empty when it is no object there. */
export function knownFields(schema: AnySchema, value: unknown): readonly string[] {
  const fields = objectsFor(schema, value).flatMap((object) => Object.keys(object.shape));
  return [...new Set(fields)];
}

/** The schema of one field or entry of `value`; null where there is none. */
export function childSchema(
  schema: AnySchema,
  value: unknown,
  key: string | number,
): AnySchema | null {
  const inner = bare(schema);
  if (typeof key === 'number') return entrySchema(inner, key);
  const owners = objectsFor(inner, value).filter((object) => Object.hasOwn(object.shape, key));
  return owners[0]?.shape[key] ?? null;
}

function entrySchema(schema: AnySchema, index: number): AnySchema | null {
  if (schema instanceof z.ZodArray) return schema.element;
  return schema instanceof z.ZodTuple ? (schema.def.items[index] ?? null) : null;
}
