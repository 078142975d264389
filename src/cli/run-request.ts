/** What a call of `run` asks for, checked before anything is read: parts, folders, workers. */
import { join, parse } from 'node:path';
import { nearestWord } from '../recipe/nearest';
import type { Call } from './command';
import { wholeNumberOption, wrongCall } from './options';

/** Parts of a result that can be asked for by `--only`. */
export const resultParts = ['maps', 'h5', 'pixels', 'summary', 'blend'] as const;
export type ResultPart = (typeof resultParts)[number];

/** Parts that are spoken of and cannot be made by this build. */
const laterParts: readonly string[] = ['fit', 'features', 'report'];

export interface ScanTask {
  /** as given on the command line */
  readonly scanPath: string;
  /** DIR/STEM */
  readonly folder: string;
}

export interface RunRequest {
  readonly recipePath: string;
  readonly parts: ReadonlySet<ResultPart>;
  /** null: as many as there are processor cores */
  readonly workers: number | null;
  readonly tasks: readonly ScanTask[];
}

/** @throws RimlightError 'usage' - when the call asks for something that is not there, or two scans would share a folder */
export function parseRunRequest(call: Call): RunRequest {
  return {
    recipePath: needed(call, 'recipe'),
    parts: partsOf(call),
    workers: wholeNumberOption(call, 'workers', { least: 1, most: 256 }),
    tasks: tasksOf(call, needed(call, 'out')),
  };
}

function needed(call: Call, name: string): string {
  const value = call.options.get(name);
  if (value === undefined) throw wrongCall(call.spec, `--${name} is missing`);
  return value;
}

function partsOf({ spec, options }: Call): ReadonlySet<ResultPart> {
  const only = options.get('only');
  if (only === undefined) return new Set(resultParts);
  const parts = only.split(',').map((word) => {
    const part = resultParts.find((known) => known === word.trim());
    if (part !== undefined) return part;
    if (laterParts.includes(word.trim())) {
      throw wrongCall(
        spec,
        `this build cannot make "${word.trim()}" yet`,
        'Leave it out of --only.',
      );
    }
    const nearest = nearestWord(word, resultParts);
    throw wrongCall(
      spec,
      `there is no part "${word.trim()}" to write`,
      nearest === null
        ? `Give one or more of ${resultParts.join(', ')}, with commas.`
        : `Did you mean "${nearest}"?`,
    );
  });
  return new Set(parts);
}

/** Folders that differ in capitals only are one on many disks. */
function tasksOf({ spec, operands }: Call, out: string): readonly ScanTask[] {
  const taken = new Map<string, string>();
  return operands.map((scanPath) => {
    const stem = stemOf(scanPath);
    const other = taken.get(stem.toLowerCase());
    if (other !== undefined) {
      throw wrongCall(
        spec,
        other === scanPath
          ? `${scanPath} is given twice`
          : `${other} and ${scanPath} would both be written to ${join(out, stem)}`,
        other === scanPath ? 'Give each scan once.' : 'Run them into different --out folders.',
      );
    }
    taken.set(stem.toLowerCase(), scanPath);
    return { scanPath, folder: join(out, stem) };
  });
}

/** The file's name without its ending; a name that is nothing but dots keeps its ending ("...h5" would be ".."). */
function stemOf(path: string): string {
  const { name, base } = parse(path);
  return /^\.*$/.test(name) ? base.replace(/^\.+/, '') || 'scan' : name;
}
