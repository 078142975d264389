/**
 * What one part of a recipe says of another: names used once, maps that exist, ties that lead
 * somewhere, regions that are drawn. Reads a value that may be invalid elsewhere, so that problems of
 * both kinds are told together.
 */
import { mostBands } from './band-block';
import { mostChannels } from './blend-block';
import { parseMapName } from './map-names';
import { mostComponents } from './model-block';
import { nearestWord } from './nearest';
import { offeredMapsLoosely } from './offered-maps';
import { type PathParts, type RecipeProblem, wrongValue } from './problems';
import { isRecord, type LooseRecord, quoted } from './schema-parts';
import { shapeParameters } from './shape-parameters';
import { unstrainedRegion } from './strain-block';
import { tieProblems } from './ties';

interface Known {
  /** maps by name, with their units; `.err` maps included */
  readonly maps: ReadonlyMap<string, string>;
  readonly bands: readonly string[];
  readonly components: readonly string[];
  /** components whose shape is not known: any parameter of theirs passes, the shape itself is told */
  readonly vague: ReadonlySet<string>;
  readonly regions: readonly string[];
}

export function referenceProblems(document: unknown): readonly RecipeProblem[] {
  if (!isRecord(document)) return [];
  // Past the most there may be, their number is the problem.
  const value = Array.isArray(document.bands)
    ? { ...document, bands: document.bands.slice(0, mostBands) }
    : document;
  const known = knownOf(value);
  const components = componentsOf(value);
  return [
    ...repeatedNames(value.bands, ['bands']),
    ...repeatedNames(components, ['model', 'components']),
    ...tieProblems(components),
    ...blendProblems(value, known),
    ...repeatedNames(value.pins, ['pins']),
    ...repeatedNames(value.regions, ['regions']),
    ...strainProblems(value, known),
    ...featureProblems(value, known),
  ];
}

function componentsOf(recipe: LooseRecord): readonly unknown[] {
  const components = isRecord(recipe.model) ? recipe.model.components : undefined;
  return Array.isArray(components) ? components.slice(0, mostComponents) : [];
}

function knownOf(recipe: LooseRecord): Known {
  const maps = new Map<string, string>();
  for (const map of offeredMapsLoosely(recipe)) {
    maps.set(map.name, map.unit);
    if (map.hasErrors) maps.set(`${map.name}.err`, map.unit);
  }
  const components = componentsOf(recipe);
  const vague = components.filter(
    (component) => isRecord(component) && shapeParameters(component.shape).length === 0,
  );
  return {
    maps,
    bands: namesOf(recipe.bands),
    components: namesOf(components),
    vague: new Set(namesOf(vague)),
    regions: namesOf(recipe.regions),
  };
}

function namesOf(list: unknown): readonly string[] {
  if (!Array.isArray(list)) return [];
  return list.flatMap((entry: unknown) =>
    isRecord(entry) && typeof entry.name === 'string' ? [entry.name] : [],
  );
}

/** Names that differ in capitals only would be one file on many disks. */
function repeatedNames(list: unknown, path: PathParts): readonly RecipeProblem[] {
  if (!Array.isArray(list)) return [];
  const seen = new Map<string, string>();
  const problems: RecipeProblem[] = [];
  for (const [index, entry] of list.entries()) {
    const name: unknown = isRecord(entry) ? entry.name : undefined;
    if (typeof name !== 'string') continue;
    const first = seen.get(name.toLowerCase());
    if (first !== undefined) {
      const why = first === name ? 'is taken' : `differs from "${first}" in capitals only`;
      problems.push(
        wrongValue({
          path: [...path, index, 'name'],
          value: name,
          expected: `another name; this one ${why}`,
        }),
      );
    }
    seen.set(name.toLowerCase(), name);
  }
  return problems;
}

function blendProblems({ blend }: LooseRecord, known: Known): readonly RecipeProblem[] {
  if (!isRecord(blend) || !Array.isArray(blend.channels)) return [];
  return blend.channels
    .slice(0, mostChannels)
    .flatMap((channel: unknown, index) =>
      isRecord(channel)
        ? sourceProblems(channel.source, ['blend', 'channels', index, 'source'], known)
        : [],
    );
}

function strainProblems({ strain }: LooseRecord, known: Known): readonly RecipeProblem[] {
  if (!isRecord(strain)) return [];
  return (['pl', 'raman'] as const).flatMap((method) => {
    const block = strain[method];
    if (!isRecord(block)) return [];
    const path = ['strain', method, 'source'];
    const units = method === 'pl' ? ['eV'] : ['eV', 'cm-1'];
    return [
      ...sourceProblems(block.source, path, known),
      ...unitProblems(block.source, path, units, known),
      ...regionProblems(block.unstrained, ['strain', method, 'unstrained', 'region'], known),
    ];
  });
}

function unitProblems(
  source: unknown,
  path: PathParts,
  units: readonly string[],
  known: Known,
): readonly RecipeProblem[] {
  const unit = typeof source === 'string' ? known.maps.get(source) : undefined;
  if (unit === undefined || (units.includes(unit) && !String(source).endsWith('.err'))) return [];
  return [
    wrongValue({ path, value: source, expected: `a map of energies, in ${units.join(' or ')}` }),
  ];
}

function regionProblems(
  unstrained: unknown,
  path: PathParts,
  known: Known,
): readonly RecipeProblem[] {
  const region = unstrainedRegion(unstrained);
  if (region === null || known.regions.includes(region)) return [];
  const expected =
    known.regions.length === 0
      ? 'the name of a region, and the recipe has none'
      : `one of the regions ${quoted(known.regions, 'or')}`;
  return [
    wrongValue({ path, value: region, expected, nearest: nearestWord(region, known.regions) }),
  ];
}

function featureProblems({ features }: LooseRecord, known: Known): readonly RecipeProblem[] {
  return isRecord(features) ? sourceProblems(features.source, ['features', 'source'], known) : [];
}

function sourceProblems(source: unknown, path: PathParts, known: Known): readonly RecipeProblem[] {
  if (typeof source !== 'string' || source === '' || known.maps.has(source)) return [];
  const parsed = parseMapName(source);
  if (parsed?.kind === 'fit' && known.vague.has(parsed.component)) return [];
  const nearest = nearestWord(source, [...known.maps.keys()]);
  return [wrongValue({ path, value: source, expected: expectedSource(source, known), nearest })];
}

function expectedSource(source: string, known: Known): string {
  const parsed = parseMapName(source);
  if (parsed?.kind === 'band' && !known.bands.includes(parsed.band)) {
    return among('band', known.bands);
  }
  if (parsed?.kind === 'fit' && !known.components.includes(parsed.component)) {
    return among('component', known.components);
  }
  if (parsed?.kind === 'fit') return `a parameter that "${parsed.component}" has`;
  if (parsed?.kind === 'despike') return 'another map, or a despike step in "condition"';
  if (parsed?.kind === 'fit-quality') return 'another map, or a "model" block';
  if (parsed !== null) return 'another map, or a "strain" block that makes this one';
  return 'the name of a map this recipe makes, such as "scan.total" or "band.NAME.integral"';
}

function among(noun: string, names: readonly string[]): string {
  if (names.length === 0) return `a map of a ${noun} the recipe has, and it has none`;
  return `a map of the ${noun} ${quoted(names, 'or')}`;
}
