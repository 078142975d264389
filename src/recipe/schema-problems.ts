/** What the schema objects to, as problems a user can act on: path, value, expectation, nearest word. */
import * as z from 'zod';
import { nearestWord } from './nearest';
import {
  formatPath,
  joinPaths,
  type PathParts,
  type RecipeProblem,
  statedProblem,
  wrongValue,
} from './problems';
import { isRecord, quoted } from './schema-parts';
import { childSchema, knownFields } from './schema-walk';

type Issue = z.core.$ZodIssue;

/** Every way in which `value` departs from `schema`; empty when it does not. */
export function schemaProblems(schema: z.core.$ZodType, value: unknown): readonly RecipeProblem[] {
  const result = z.safeParse(schema, value, { error: expectedOf });
  if (result.success) return [];
  return result.error.issues.flatMap((issue) => problemsOf(issue, { schema, value, base: [] }));
}

interface Place {
  readonly schema: z.core.$ZodType;
  readonly value: unknown;
  /** path of the union an issue was found in; its own path goes on from there */
  readonly base: PathParts;
}

function problemsOf(issue: Issue, place: Place): readonly RecipeProblem[] {
  const path = [...place.base, ...issue.path];
  const value = valueAt(place.value, path);
  switch (issue.code) {
    case 'unrecognized_keys':
      return issue.keys.map((key) => unknownField(place, path, key));
    case 'invalid_union':
      return unionProblems(issue, path, value, place);
    case 'invalid_value':
      return [
        wrongValue({
          path,
          value,
          expected: issue.message,
          nearest: nearestWord(value, words(issue.values)),
        }),
      ];
    default:
      return [wrongValue({ path, value, expected: issue.message, nearest: nearestOfRule(issue) })];
  }
}

/** A rule that knows the word meant says it beside its issue. */
function nearestOfRule(issue: Issue): string | null {
  const nearest: unknown = issue.code === 'custom' ? issue.params?.nearest : undefined;
  return typeof nearest === 'string' ? nearest : null;
}

function unknownField(place: Place, path: PathParts, key: string): RecipeProblem {
  const fields = fieldsAt(place, path);
  const nearest = nearestWord(key, fields);
  const parts = [...path, key];
  return statedProblem({
    path: parts,
    value: valueAt(place.value, parts),
    expected: fields.length === 0 ? 'no such field' : quoted(fields, 'or'),
    nearest,
    message: `unknown field "${key}"${nearest === null ? `; fields here are ${fields.join(', ')}` : ''}`,
  });
}

function fieldsAt(place: Place, path: PathParts): readonly string[] {
  const schema = schemaAt(place, path);
  return schema === null ? [] : knownFields(schema, valueAt(place.value, path));
}

function schemaAt(place: Place, path: PathParts): z.core.$ZodType | null {
  let schema: z.core.$ZodType | null = place.schema;
  let value = place.value;
  for (const part of path) {
    if (schema === null || typeof part === 'symbol') return null;
    schema = childSchema(schema, value, part);
    value = valueAt(value, [part]);
  }
  return schema;
}

/**
 * A union tells of all its forms. An object is held against the object forms only; where one of them
 * is meant, its own problems are told, otherwise what the union as a whole expects.
 */
function unionProblems(
  issue: z.core.$ZodIssueInvalidUnion,
  path: PathParts,
  value: unknown,
  place: Place,
): readonly RecipeProblem[] {
  if ('discriminator' in issue && typeof issue.discriminator === 'string') {
    return wordProblems(
      issue.discriminator,
      words(('options' in issue && issue.options) || []),
      path,
      place,
    );
  }
  const forms = issue.errors.filter((issues) => !issues.some((one) => isOfOtherType(one)));
  const [form, ...others] = isRecord(value) ? forms : [];
  if (form !== undefined && others.length === 0) {
    return form.flatMap((one) => problemsOf(one, { ...place, base: path }));
  }
  const unknown = forms.length === 0 ? [] : unknownToAll(forms);
  if (isRecord(value) && unknown.length > 0) {
    return unknown.map((key) => unknownField(place, path, key));
  }
  const known = issue.errors
    .flat()
    .flatMap((one) => (one.code === 'invalid_value' ? words(one.values) : []));
  return [wrongValue({ path, value, expected: issue.message, nearest: nearestWord(value, known) })];
}

/**
 * The word that says which form an object has is missing or unknown. The rest of the object is held
 * against the form most likely meant, or its field names against those of all forms.
 */
function wordProblems(
  field: string,
  options: readonly string[],
  path: PathParts,
  place: Place,
): readonly RecipeProblem[] {
  const word = valueAt(place.value, path);
  const nearest = nearestWord(word, options);
  const own = wrongValue({ path, value: word, expected: quoted(options, 'or'), nearest });
  const parent = path.slice(0, -1);
  const object = valueAt(place.value, parent);
  const schema = schemaAt(place, parent);
  if (!isRecord(object) || schema === null) return [own];
  if (nearest !== null) {
    const repaired = schemaProblems(schema, { ...object, [field]: nearest });
    const base = formatPath(parent);
    return [own, ...repaired.map((one) => ({ ...one, path: joinPaths(base, one.path) }))];
  }
  const fields = knownFields(schema, object);
  const unknown = Object.keys(object).filter((key) => !fields.includes(key));
  return [own, ...unknown.map((key) => unknownField(place, parent, key))];
}

function isOfOtherType(issue: Issue): boolean {
  return (
    issue.path.length === 0 && (issue.code === 'invalid_type' || issue.code === 'invalid_value')
  );
}

function unknownToAll(forms: readonly (readonly Issue[])[]): readonly string[] {
  const [first, ...rest] = forms.map((issues) =>
    issues.flatMap((issue) => (issue.code === 'unrecognized_keys' ? issue.keys : [])),
  );
  return (first ?? []).filter((key) => rest.every((keys) => keys.includes(key)));
}

/** What an issue expected, a phrase; schemas that know better say it themselves. */
function expectedOf(issue: z.core.$ZodRawIssue): string {
  switch (issue.code) {
    case 'invalid_type':
      return typeNamed(issue.expected, issue.input);
    case 'invalid_value':
      return quoted(issue.values, 'or');
    case 'too_small':
      return limitNamed(
        issue.origin,
        Number(issue.minimum),
        issue.inclusive === false ? 'above' : 'at least',
      );
    case 'too_big':
      return limitNamed(
        issue.origin,
        Number(issue.maximum),
        issue.inclusive === false ? 'below' : 'at most',
      );
    default:
      return 'another value';
  }
}

const typeNames: Readonly<Record<string, string>> = {
  number: 'a number',
  int: 'a whole number',
  string: 'text in double quotes',
  boolean: 'true or false',
  object: 'an object { … }',
  array: 'a list [ … ]',
  tuple: 'a list [ … ]',
};

function typeNamed(expected: string, input: unknown): string {
  const name = typeNames[expected] ?? expected;
  const isNumber = expected === 'number' || expected === 'int';
  if (isNumber && typeof input === 'number' && !Number.isInteger(input) && Number.isFinite(input))
    return 'a whole number';
  if (isNumber && typeof input === 'number' && !Number.isFinite(input)) return 'a finite number';
  const isQuotedNumber =
    isNumber && typeof input === 'string' && input.trim() !== '' && Number.isFinite(Number(input));
  return isQuotedNumber ? `${name}, without quotes` : name;
}

function limitNamed(origin: string, limit: number, relation: string): string {
  if (origin === 'string') return `text of ${relation} ${limit} characters`;
  if (origin === 'array')
    return `a list of ${relation} ${limit} ${limit === 1 ? 'entry' : 'entries'}`;
  return `a number${relation === 'above' || relation === 'below' ? '' : ' of'} ${relation} ${limit}`;
}

function words(values: readonly unknown[]): readonly string[] {
  return values.filter((value) => typeof value === 'string');
}

function valueAt(value: unknown, path: PathParts): unknown {
  let at = value;
  for (const part of path) {
    if (Array.isArray(at) && typeof part === 'number') at = at[part];
    else if (isRecord(at) && typeof part === 'string' && Object.hasOwn(at, part)) at = at[part];
    else return undefined;
  }
  return at;
}
