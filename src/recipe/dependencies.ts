/**
 * What each derived map depends on, and the key its result is kept under: equal keys, equal numbers.
 * A key is a hash of the scan's own hash and of the parts of the recipe that the map is made from,
 * so editing one band leaves the results of the others in place, and band names, pins, blend and
 * title never matter.
 */
import { sha256 } from '@noble/hashes/sha2.js';
import { bytesToHex, utf8ToBytes } from '@noble/hashes/utils.js';
import { assertUnreachable, RimlightError } from '../errors';
import { canonicalJson } from './canonical-json';
import { floorOf } from './defaults';
import { type MapName, parseMapName } from './map-names';
import type { ConditionStep, Recipe, RecipeBand } from './schema';
import { isRecord } from './schema-parts';
import { unstrainedRegion } from './strain-block';

/** Raised when the same parts of a recipe come to mean other numbers, so that kept results are made anew. */
const keyFormat = 1;

/** SHA-256 of files a recipe names (axis, height, dark, …), by the name the recipe gives them. */
export type CompanionHashes = ReadonlyMap<string, string>;

/**
 * The key of a map's result, 64 hexadecimal digits. A map and its `.err` share one key: they are made
 * together.
 *
 * @param mapName - contract name, such as "band.tail.centroid"
 * @param scanSha256 - SHA-256 of the scan file
 * @param companions - hashes of the files the recipe names; one that is not in it counts by its name alone
 * @throws RimlightError 'recipe' - when the recipe makes no such map
 */
export function dependencyKey(
  mapName: string,
  recipe: Recipe,
  scanSha256: string,
  companions: CompanionHashes = new Map(),
): string {
  const parts = dependenciesOf(mapName, recipe);
  return digest([
    'rimlight',
    keyFormat,
    scanSha256,
    parts.map((part) => digestOf(part, companions)),
  ]);
}

/** A part of the recipe a map depends on, or a fixed word. */
export type Dependency = string | object;

/**
 * The parts of the recipe one map is made from, what it is of first: plain values, the same for
 * recipes that mean the same. The scan's counts are understood.
 *
 * @throws RimlightError 'recipe' - when the recipe makes no such map
 */
export function dependenciesOf(mapName: string, recipe: Recipe): readonly Dependency[] {
  const name = parseMapName(mapName);
  if (name === null) throw noSuchMap(mapName);
  const counts = [recipe.scan ?? nothing, ...stepsOf(recipe)];
  return [...ownParts(name, mapName, recipe), ...counts];
}

/** One object for "left out", so that its digest is remembered too. */
const nothing = {};

function ownParts(name: MapName, mapName: string, recipe: Recipe): readonly Dependency[] {
  switch (name.kind) {
    case 'scan':
    case 'despike':
      return [`${name.kind}.${name.quantity}`];
    case 'band': {
      const band = recipe.bands?.find((one) => one.name === name.band);
      if (band === undefined) throw noSuchMap(mapName);
      return [`band.${name.quantity}`, intervalOf(band)];
    }
    case 'fit':
    case 'fit-quality':
      if (recipe.model === undefined) throw noSuchMap(mapName);
      // Every parameter comes out of the same fit, so the whole model counts, names and all.
      return [
        name.kind === 'fit' ? `fit.${name.component}.${name.parameter}` : mapName,
        recipe.model,
      ];
    case 'strain':
      return strainParts(name.method, mapName, recipe);
    case 'strain-height': {
      const height = recipe.strain?.height;
      if (height === undefined) throw noSuchMap(mapName);
      return [`strain.height.${name.component}`, height];
    }
    default:
      return assertUnreachable(name);
  }
}

function strainParts(
  method: 'pl' | 'raman',
  mapName: string,
  recipe: Recipe,
): readonly Dependency[] {
  const block = recipe.strain?.[method];
  if (block === undefined || parseMapName(block.source)?.kind === 'strain')
    throw noSuchMap(mapName);
  const { source, ...gauge } = block;
  const sourceName = parseMapName(source);
  if (sourceName === null) throw noSuchMap(source);
  const region = recipe.regions?.find((one) => one.name === unstrainedRegion(block.unstrained));
  const own = region === undefined ? [gauge] : [gauge, region];
  return [`strain.${method}`, ...own, ...ownParts(sourceName, source, recipe)];
}

/** What the numbers of a band come from: not its name, and not the order its ends were written in. */
function intervalOf(band: RecipeBand): Dependency {
  const from = Math.min(band.from, band.to);
  const to = Math.max(band.from, band.to);
  return { from, to, unit: band.unit, floor: floorOf(band) };
}

/** Steps that are off change nothing. */
function stepsOf(recipe: Recipe): readonly ConditionStep[] {
  return (recipe.condition ?? []).filter(({ off }) => off !== true);
}

function noSuchMap(mapName: string): RimlightError {
  return new RimlightError('recipe', {
    what: `the recipe makes no map "${mapName}"`,
    where: '',
    hint: 'Name a map of a band, component or block that the recipe has.',
  });
}

/** Parts of a recipe are never changed in place, so the digest of each is worked out once. */
const remembered = new WeakMap<object, string>();

function digestOf(part: Dependency, companions: CompanionHashes): string {
  if (typeof part === 'string') return part;
  const files = filesIn(part).map((file) => [file, companions.get(file) ?? null]);
  const known = remembered.get(part) ?? digest(part);
  remembered.set(part, known);
  return files.length === 0 ? known : digest([known, files]);
}

/** Files named by a part, at whatever depth: their content counts as much as their name. */
function filesIn(part: unknown): readonly string[] {
  if (Array.isArray(part)) return part.some(isRecord) ? part.flatMap(filesIn) : [];
  if (!isRecord(part)) return [];
  return Object.entries(part).flatMap(([key, value]) =>
    key === 'file' && typeof value === 'string' ? [value] : filesIn(value),
  );
}

function digest(value: unknown): string {
  return bytesToHex(sha256(utf8ToBytes(canonicalJson(value))));
}
