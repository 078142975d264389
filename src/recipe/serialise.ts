/**
 * A recipe as text, always the same for the same recipe: fields in the order of the schema, two
 * spaces, small objects and lists on one line, so that saved recipes compare well line by line.
 */
import type * as z from 'zod';
import { type Recipe, recipeSchema } from './schema';
import { isRecord } from './schema-parts';
import { childSchema, knownFields } from './schema-walk';

/** What stands on one line ends by here. */
const lineWidth = 100;

/** Text that `parseRecipe` reads back to an equal recipe; ends with a line break. */
export function serialiseRecipe(recipe: Recipe): string {
  // The outermost object is always spread out: one line for each block at least.
  return `${spread(fieldsOf(recipe, recipeSchema), '', '{', '}')}\n`;
}

type AnySchema = z.core.$ZodType | null;

/** One field or entry: `"name": ` or nothing, and its value. */
interface Member {
  readonly label: string;
  readonly value: unknown;
  readonly schema: AnySchema;
}

function fieldsOf(value: Readonly<Record<string, unknown>>, schema: AnySchema): readonly Member[] {
  const known = schema === null ? [] : knownFields(schema, value);
  const given = Object.keys(value);
  const ordered = [
    ...known.filter((key) => Object.hasOwn(value, key)),
    ...given.filter((key) => !known.includes(key)),
  ];
  return ordered.map((key) => ({
    label: `${JSON.stringify(key)}: `,
    value: value[key],
    schema: schema === null ? null : childSchema(schema, value, key),
  }));
}

function entriesOf(list: readonly unknown[], schema: AnySchema): readonly Member[] {
  return list.map((value, index) => ({
    label: '',
    value,
    schema: schema === null ? null : childSchema(schema, list, index),
  }));
}

/** On one line where it fits, spread out otherwise. */
function written({ label, value, schema }: Member, indent: string): string {
  const room = lineWidth - indent.length - label.length - 1;
  if (isNumbers(value) && value.length > 0) return label + numbers(value, indent, room);
  const line = isSpread(value) ? null : onOneLine(value, schema);
  if (line !== null && line.length <= room) return label + line;
  if (Array.isArray(value)) return label + spread(entriesOf(value, schema), indent, '[', ']');
  if (isRecord(value)) return label + spread(fieldsOf(value, schema), indent, '{', '}');
  return label + scalar(value);
}

function spread(members: readonly Member[], indent: string, open: string, close: string): string {
  if (members.length === 0) return open + close;
  const inner = `${indent}  `;
  const lines = members.map((member) => inner + written(member, inner));
  return `${open}\n${lines.join(',\n')}\n${indent}${close}`;
}

function onOneLine(value: unknown, schema: AnySchema): string {
  if (Array.isArray(value)) {
    return `[${entriesOf(value, schema)
      .map((entry) => onOneLine(entry.value, entry.schema))
      .join(', ')}]`;
  }
  if (!isRecord(value)) return scalar(value);
  const fields = fieldsOf(value, schema);
  if (fields.length === 0) return '{}';
  return `{ ${fields.map((field) => field.label + onOneLine(field.value, field.schema)).join(', ')} }`;
}

/** Lists of objects have a line for each even where one would do: the next one added is then one line more. */
function isSpread(value: unknown): boolean {
  if (Array.isArray(value)) return value.some(isRecord);
  return isRecord(value) && Object.values(value).some(isSpread);
}

function isNumbers(value: unknown): value is readonly number[] {
  return Array.isArray(value) && value.every((entry) => typeof entry === 'number');
}

/** Many numbers fill lines, as many to a line as fit. */
function numbers(values: readonly number[], indent: string, room: number): string {
  const line = `[${values.map(scalar).join(', ')}]`;
  if (line.length <= room) return line;
  const inner = `${indent}  `;
  const lines: string[] = [];
  let filling = inner;
  for (const [index, value] of values.entries()) {
    const word = scalar(value) + (index < values.length - 1 ? ',' : '');
    const isFresh = filling === inner;
    if (!isFresh && filling.length + 1 + word.length > lineWidth) {
      lines.push(filling);
      filling = inner + word;
    } else filling += isFresh ? word : ` ${word}`;
  }
  lines.push(filling);
  return `[\n${lines.join('\n')}\n${indent}]`;
}

/** Minus zero keeps its sign, as JSON allows and the language's own writer does not. */
function scalar(value: unknown): string {
  return Object.is(value, -0) ? '-0' : JSON.stringify(value);
}
