/** A recipe on disk, and the files it names, which lie relative to its own folder. */
import { readFile, stat } from 'node:fs/promises';
import { basename, dirname, resolve } from 'node:path';
import { RimlightError } from '../errors';
import { recipeError } from '../recipe/problems';
import type { Recipe } from '../recipe/schema';
import { parseRecipe } from '../recipe/validate';

/** A file that is there. */
export interface FoundFile {
  /** without folder */
  readonly name: string;
  /** absolute, or as given on the command line */
  readonly path: string;
  /** bytes */
  readonly size: number;
}

export interface RecipeFile extends FoundFile {
  readonly text: string;
  readonly recipe: Recipe;
}

/** @throws RimlightError 'usage' when it cannot be read, 'recipe' when it is not valid */
export async function readRecipeFile(path: string): Promise<RecipeFile> {
  const text = await readRecipeText(path);
  const result = parseRecipe(text);
  if (!result.ok) throw recipeError(result.problems, path);
  const size = Buffer.byteLength(text);
  return { name: basename(path), path, size, text, recipe: result.recipe };
}

/** @throws RimlightError 'usage' - when there is no such file or it cannot be read */
export async function readRecipeText(path: string): Promise<string> {
  try {
    return await readFile(path, 'utf8');
  } catch (error) {
    throw new RimlightError(
      'usage',
      {
        what: `the recipe cannot be read: ${reasonOf(error)}`,
        where: path,
        hint: 'Check the path.',
      },
      { cause: error },
    );
  }
}

/**
 * The files a recipe needs beside the scan: its axis and height map, and what its steps name.
 *
 * @throws RimlightError 'recipe' - when one is missing, or two have the same name in different folders
 */
export async function findCompanions({ path, recipe }: RecipeFile): Promise<readonly FoundFile[]> {
  const found = new Map<string, FoundFile>();
  for (const { place, file } of filesNamed(recipe)) {
    const target = resolve(dirname(path), file);
    const name = basename(target);
    const size = await sizeOfFile(target);
    if (typeof size !== 'number') {
      throw new RimlightError('recipe', {
        what: `the file "${file}" cannot be read: ${size.reason}`,
        where: `${path}: ${place}`,
        hint: 'Paths in a recipe are relative to its own folder.',
      });
    }
    const other = found.get(name);
    if (other !== undefined && other.path !== target) {
      throw new RimlightError('recipe', {
        what: `two files called "${name}" are named, in different folders`,
        where: `${path}: ${place}`,
        hint: 'Rename one of them.',
      });
    }
    found.set(name, { name, path: target, size });
  }
  return [...found.values()];
}

/** @throws RimlightError 'scan' - when it is not there, not a file or not readable */
export async function findScan(path: string): Promise<FoundFile> {
  const size = await sizeOfFile(path);
  if (typeof size === 'number') return { name: basename(path), path: resolve(path), size };
  throw new RimlightError('scan', {
    what: `the scan cannot be read: ${size.reason}`,
    where: path,
    hint: 'Check the path.',
  });
}

function filesNamed(recipe: Recipe): readonly { readonly place: string; readonly file: string }[] {
  const { scan, condition = [] } = recipe;
  const named: [string, string | undefined][] = [
    ['scan.axis.file', scan?.axis?.file],
    ['scan.height.file', scan?.height?.file],
    ...condition.map((step, index): [string, string | undefined] => [
      `condition[${index}].file`,
      'file' in step && step.off !== true ? step.file : undefined,
    ]),
  ];
  return named.flatMap(([place, file]) => (file === undefined ? [] : [{ place, file }]));
}

async function sizeOfFile(path: string): Promise<number | { readonly reason: string }> {
  try {
    const found = await stat(path);
    if (found.isFile()) return found.size;
    return { reason: found.isDirectory() ? 'it is a folder' : 'it is no plain file' };
  } catch (error) {
    return { reason: reasonOf(error) };
  }
}

const reasons: Readonly<Record<string, string>> = {
  ENOENT: 'there is no such file',
  ENOTDIR: 'a part of its path is no folder',
  EACCES: 'access is denied',
  EPERM: 'access is denied',
  EISDIR: 'it is a folder',
  ENAMETOOLONG: 'its name is too long',
  ENOSPC: 'the disk is full',
  EDQUOT: 'the quota of the disk is used up',
  EROFS: 'the disk is read-only',
  EMFILE: 'too many files are open',
};

/** Why the system refused, in words where we have them. */
export function reasonOf(error: unknown): string {
  const code = (error as NodeJS.ErrnoException | null)?.code;
  if (code !== undefined) return reasons[code] ?? code;
  return error instanceof Error ? error.message : String(error);
}
