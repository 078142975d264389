/** What is wrong with a recipe: one entry for each place, and the error made of them. */
import { RimlightError } from '../errors';

export interface RecipeProblem {
  /** "bands[1].unit"; "" for the document as a whole */
  readonly path: string;
  /** what stands there; undefined where something is missing */
  readonly value: unknown;
  /** what was expected there, a phrase: `"eV", "meV", "nm" or "cm-1"` */
  readonly expected: string;
  /** the known word nearest to what stands there; null when none is near */
  readonly nearest: string | null;
  /** the problem in words, without path, nearest word and full stop */
  readonly message: string;
  /** what to do about it, a sentence; null where correcting that place is all there is to do */
  readonly hint: string | null;
  /** place in the text, from 1; null for a recipe that was not read from text */
  readonly position: TextPosition | null;
}

export interface TextPosition {
  readonly line: number;
  readonly column: number;
}

export type PathParts = readonly PropertyKey[];

/** `bands[1].unit`; a field that is no plain word is quoted: `strain.raman.unstrained["cm-1"]`. */
export function formatPath(parts: PathParts): string {
  let path = '';
  for (const part of parts) {
    if (typeof part === 'number') path += `[${part}]`;
    else if (/^[A-Za-z_$][\w$]*$/.test(String(part)))
      path += (path === '' ? '' : '.') + String(part);
    else path += `[${JSON.stringify(String(part))}]`;
  }
  return path;
}

/** `bands[1]` and `unit` as one path. */
export function joinPaths(base: string, path: string): string {
  return base === '' || path === '' || path.startsWith('[') ? base + path : `${base}.${path}`;
}

/** A value as it is shown in a message: its JSON, cut short. */
export function showValue(value: unknown): string {
  if (typeof value === 'number') return String(value);
  if (Array.isArray(value)) return `a list of ${value.length}`;
  if (typeof value === 'object' && value !== null) return 'an object';
  const text = JSON.stringify(value) ?? `a ${typeof value}`;
  return text.length <= 60 ? text : `${text.slice(0, 57)}…"`;
}

interface ProblemParts {
  readonly path: PathParts;
  readonly value: unknown;
  readonly expected: string;
  readonly nearest?: string | null;
  readonly hint?: string;
}

/** A value that is missing or not what was expected. */
export function wrongValue(parts: ProblemParts): RecipeProblem {
  const { path, value, expected } = parts;
  const name = lastName(path) || 'the document';
  const message =
    value === undefined
      ? `${name} is missing; expected ${expected}`
      : `${name} is ${showValue(value)}; expected ${expected}`;
  return statedProblem({ ...parts, message });
}

/** `unit` of bands[1].unit, `rle[2]` of regions[0].rle[2]. */
function lastName(path: PathParts): string {
  const last = path.findLastIndex((part) => typeof part !== 'number');
  return formatPath(path.slice(Math.max(last, 0)));
}

/** A problem stated in a sentence of its own. */
export function statedProblem(parts: ProblemParts & { readonly message: string }): RecipeProblem {
  const { path, value, expected, nearest = null, message, hint = null } = parts;
  return { path: formatPath(path), value, expected, nearest, message, hint, position: null };
}

/** `bands[1].unit, line 12, column 30: unit is "ev"; expected …; did you mean "eV"?`, one line. */
export function formatProblem({ path, message, nearest, position }: RecipeProblem): string {
  const place = placeOf(path, position);
  const suggestion = nearest === null ? '' : `; did you mean "${nearest}"?`;
  return `${place === '' ? '' : `${place}: `}${message}${suggestion}`;
}

function placeOf(path: string, position: TextPosition | null): string {
  const line = position === null ? '' : `line ${position.line}, column ${position.column}`;
  return [path, line].filter((part) => part !== '').join(', ');
}

/**
 * The error of a recipe that cannot be used: the first problem, and how many more there are.
 *
 * @param problems - at least one
 * @param fileName - named first in `where`, when the recipe came from a file
 */
export function recipeError(problems: readonly RecipeProblem[], fileName = ''): RimlightError {
  const [first, ...others] = problems;
  if (first === undefined) throw new Error('a recipe error needs a problem');
  const { message, path, position, nearest, hint } = first;
  const noun = others.length === 1 ? 'problem' : 'problems';
  const more = others.length === 0 ? '' : `, and ${others.length} more ${noun}`;
  const correct = `Correct ${others.length === 0 ? 'this place' : 'these places'} in the recipe.`;
  return new RimlightError('recipe', {
    what: message + more,
    where: [fileName, placeOf(path, position)].filter((part) => part !== '').join(': '),
    hint: hint ?? (nearest === null ? correct : `Did you mean "${nearest}"?`),
  });
}
