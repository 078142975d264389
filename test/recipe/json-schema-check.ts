/**
 * Holds a value against a JSON Schema (draft 2020-12), as far as our emitted schema goes: a keyword it
 * does not know is an error, so that nothing passes unlooked at.
 */
type Schema = Readonly<Record<string, unknown>>;

const annotations = new Set(['$schema', '$defs', 'title', 'description', 'id', '$id']);

/** Whether `value` satisfies `schema`; `root` holds the definitions it refers to. */
export function satisfies(schema: Schema, value: unknown, root: Schema = schema): boolean {
  return Object.entries(schema).every(([keyword, argument]) => {
    if (annotations.has(keyword)) return true;
    const check = keywords[keyword];
    if (check === undefined) throw new Error(`keyword not known: ${keyword}`);
    return check(argument, value, { schema, root });
  });
}

interface Context {
  readonly schema: Schema;
  readonly root: Schema;
}

type Check = (argument: unknown, value: unknown, context: Context) => boolean;

const isObject = (value: unknown): value is Record<string, unknown> =>
  typeof value === 'object' && value !== null && !Array.isArray(value);

const onNumber =
  (test: (value: number, limit: number) => boolean): Check =>
  (limit, value) =>
    typeof value !== 'number' || test(value, limit as number);

const all = (schemas: unknown, value: unknown, root: Schema): number =>
  (schemas as Schema[]).filter((schema) => satisfies(schema, value, root)).length;

const required: Check = (names, value) =>
  !isObject(value) || (names as string[]).every((name) => Object.hasOwn(value, name));

const keywords: Readonly<Record<string, Check>> = {
  type: (type, value) => {
    if (type === 'object') return isObject(value);
    if (type === 'array') return Array.isArray(value);
    if (type === 'integer') return Number.isInteger(value);
    return typeof value === type;
  },
  const: (constant, value) => constant === value,
  enum: (words, value) => (words as unknown[]).includes(value),
  pattern: (pattern, value) =>
    typeof value !== 'string' || new RegExp(pattern as string).test(value),
  minLength: (length, value) => typeof value !== 'string' || value.length >= (length as number),
  maxLength: (length, value) => typeof value !== 'string' || value.length <= (length as number),
  minimum: onNumber((value, limit) => value >= limit),
  maximum: onNumber((value, limit) => value <= limit),
  exclusiveMinimum: onNumber((value, limit) => value > limit),
  exclusiveMaximum: onNumber((value, limit) => value < limit),
  minItems: (length, value) => !Array.isArray(value) || value.length >= (length as number),
  maxItems: (length, value) => !Array.isArray(value) || value.length <= (length as number),
  items: (schema, value, { schema: own, root }) => {
    const from = Array.isArray(own.prefixItems) ? own.prefixItems.length : 0;
    if (!Array.isArray(value) || value.length <= from) return true;
    if (schema === false) return false;
    return value.slice(from).every((entry) => satisfies(schema as Schema, entry, root));
  },
  prefixItems: (schemas, value, { root }) =>
    !Array.isArray(value) ||
    value
      .slice(0, (schemas as Schema[]).length)
      .every((entry, index) => satisfies((schemas as Schema[])[index], entry, root)),
  properties: (properties, value, { root }) =>
    !isObject(value) ||
    Object.entries(properties as Record<string, Schema>).every(
      ([name, schema]) => !Object.hasOwn(value, name) || satisfies(schema, value[name], root),
    ),
  additionalProperties: (allowed, value, { schema }) => {
    if (allowed !== false) throw new Error('only additionalProperties: false is known');
    const known = Object.keys(schema.properties as object);
    return !isObject(value) || Object.keys(value).every((name) => known.includes(name));
  },
  required,
  dependentRequired: (dependents, value, context) =>
    !isObject(value) ||
    Object.entries(dependents as Record<string, string[]>).every(
      ([name, names]) => !Object.hasOwn(value, name) || required(names, value, context),
    ),
  anyOf: (schemas, value, { root }) => all(schemas, value, root) > 0,
  oneOf: (schemas, value, { root }) => all(schemas, value, root) === 1,
  allOf: (schemas, value, { root }) => all(schemas, value, root) === (schemas as unknown[]).length,
  not: (schema, value, { root }) => !satisfies(schema as Schema, value, root),
  $ref: (reference, value, { root }) => {
    const name = /^#\/\$defs\/(.+)$/.exec(reference as string)?.[1] ?? '';
    return satisfies((root.$defs as Record<string, Schema>)[name], value, root);
  },
};
