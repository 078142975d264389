/**
 * Every edit the app makes, as a pure function from recipe to recipe: parts that did not change are
 * shared, and an edit that changes nothing returns the recipe itself (so does one of a band, pin or
 * channel that is not there). A valid recipe stays valid; a value that would break it is refused.
 */
import type { ScanChoices } from '../io/scan-choices';
import type { BandFloor } from '../science/bands/band';
import { bandSchema } from './band-block';
import { blendBlockSchema } from './blend-block';
import { assertNameIsFree, ensureFits } from './checked';
import { bandRenaming, withoutDangling, withSources } from './edit-references';
import { mergeScanChoices } from './merge-scan-choices';
import { mostPins, pinSchema } from './pin-block';
import { recipeError, wrongValue } from './problems';
import { referenceProblems } from './references';
import { regionSchema } from './region-block';
import { scanBlockSchema } from './scan-block';
import type { Blend, BlendChannel, BlendMode, Pin, Recipe, RecipeBand, Region } from './schema';
import { textSchema } from './schema-parts';

/** @throws RimlightError 'recipe' - when the title is longer than a line of text may be */
export function setTitle(recipe: Recipe, title: string): Recipe {
  if (title === (recipe.title ?? '')) return recipe;
  const { title: _, ...rest } = recipe;
  return title === '' ? rest : { ...rest, title: ensureFits(textSchema, title, ['title']) };
}

/**
 * States how the scan is read: merged into what was stated before.
 *
 * @throws RimlightError 'recipe' - when the result is no valid scan block
 */
export function setScanChoices(recipe: Recipe, choices: ScanChoices): Recipe {
  const scan = mergeScanChoices(recipe.scan ?? {}, choices);
  return { ...recipe, scan: ensureFits(scanBlockSchema, scan, ['scan']) };
}

/** Switches a step of `condition` off, or on again. */
export function toggleStep(recipe: Recipe, index: number): Recipe {
  const condition = recipe.condition;
  const step = condition?.[index];
  if (condition === undefined || step === undefined) return recipe;
  const { off, ...kept } = step;
  const toggled = off === true ? kept : { ...step, off: true };
  return { ...recipe, condition: condition.with(index, toggled) };
}

/** "band-1", or the first such name no band has. */
export function nextBandName(recipe: Recipe): string {
  return nextName('band', recipe.bands);
}

/** @throws RimlightError 'recipe' - when the band is not valid or its name is taken */
export function addBand(recipe: Recipe, band: RecipeBand): Recipe {
  const bands = recipe.bands ?? [];
  const path = ['bands', bands.length];
  ensureFits(bandSchema, band, path);
  assertNameIsFree(bands, band.name, [...path, 'name']);
  return { ...recipe, bands: [...bands, band] };
}

/** Moves both ends, in the band's own unit. A band of no width is none: then nothing changes. */
export function moveBandEdges(recipe: Recipe, name: string, from: number, to: number): Recipe {
  if (from === to) return recipe;
  return withBand(recipe, name, (band) =>
    band.from === from && band.to === to ? band : { ...band, from, to },
  );
}

/** Moves one end, in the band's own unit; onto the other end it does not go. */
export function moveBandEdge(
  recipe: Recipe,
  name: string,
  edge: 'from' | 'to',
  value: number,
): Recipe {
  const band = recipe.bands?.find((one) => one.name === name);
  if (band === undefined) return recipe;
  const ends = { from: band.from, to: band.to, [edge]: value };
  return moveBandEdges(recipe, name, ends.from, ends.to);
}

/** Writes a band in another unit, its ends given in it. */
export function setBandInterval(
  recipe: Recipe,
  name: string,
  interval: Pick<RecipeBand, 'from' | 'to' | 'unit'>,
): Recipe {
  return withBand(recipe, name, (band) => ({ ...band, ...interval }));
}

export function setBandFloor(recipe: Recipe, name: string, floor: BandFloor): Recipe {
  return withBand(recipe, name, (band) => (band.floor === floor ? band : { ...band, floor }));
}

/**
 * Renames a band, and its maps wherever the recipe names them.
 *
 * @throws RimlightError 'recipe' - when the name is none or is taken
 */
export function renameBand(recipe: Recipe, from: string, to: string): Recipe {
  const path = ['bands', recipe.bands?.findIndex((band) => band.name === from) ?? -1, 'name'];
  assertNameIsFree(recipe.bands, to, path, from);
  const renamed = withBand(recipe, from, (band) => (from === to ? band : { ...band, name: to }));
  return renamed === recipe ? recipe : withSources(renamed, bandRenaming(from, to));
}

/** Removes a band, and what was made from its maps: blend channels, strain, features. */
export function removeBand(recipe: Recipe, name: string): Recipe {
  const bands = recipe.bands?.filter((band) => band.name !== name);
  if (bands === undefined || bands.length === recipe.bands?.length) return recipe;
  return withoutDangling({ ...recipe, bands });
}

function withBand(recipe: Recipe, name: string, change: (band: RecipeBand) => RecipeBand): Recipe {
  const bands = recipe.bands ?? [];
  const index = bands.findIndex((band) => band.name === name);
  const band = bands[index];
  if (band === undefined) return recipe;
  const changed = change(band);
  if (changed === band) return recipe;
  return { ...recipe, bands: bands.with(index, ensureFits(bandSchema, changed, ['bands', index])) };
}

/** Adds a map to the blend, or begins one. @throws RimlightError 'recipe' - when it is full, or the recipe makes no such map */
export function addBlendChannel(recipe: Recipe, channel: BlendChannel): Recipe {
  const blend: Blend = recipe.blend ?? { mode: 'additive', channels: [] };
  return withBlend(recipe, { ...blend, channels: [...blend.channels, channel] });
}

/** Changes some fields of one channel. @throws RimlightError 'recipe' - when the result is not valid */
export function setBlendChannel(
  recipe: Recipe,
  index: number,
  change: Partial<BlendChannel>,
): Recipe {
  const { blend } = recipe;
  const channel = blend?.channels[index];
  if (blend === undefined || channel === undefined) return recipe;
  return withBlend(recipe, {
    ...blend,
    channels: blend.channels.with(index, { ...channel, ...change }),
  });
}

/** Removes one channel; with the last one the blend goes. */
export function removeBlendChannel(recipe: Recipe, index: number): Recipe {
  const { blend, ...rest } = recipe;
  if (blend?.channels[index] === undefined) return recipe;
  const channels = blend.channels.toSpliced(index, 1);
  return channels.length === 0 ? rest : { ...recipe, blend: { ...blend, channels } };
}

export function setBlendMode(recipe: Recipe, mode: BlendMode): Recipe {
  const { blend } = recipe;
  if (blend === undefined || blend.mode === mode) return recipe;
  return withBlend(recipe, { ...blend, mode });
}

function withBlend(recipe: Recipe, blend: Blend): Recipe {
  const changed = { ...recipe, blend: ensureFits(blendBlockSchema, blend, ['blend']) };
  const problems = referenceProblems(changed).filter(({ path }) => path.startsWith('blend'));
  if (problems.length > 0) throw recipeError(problems);
  return changed;
}

/** A, B, … Z, AA, …: the first letter no pin has. @throws RimlightError 'recipe' - when all are taken */
export function nextPinName(recipe: Recipe): string {
  const taken = new Set((recipe.pins ?? []).map(({ name }) => name));
  for (let number = 0; number < mostPins; number++) {
    const name = pinName(number);
    if (!taken.has(name)) return name;
  }
  throw recipeError([
    wrongValue({ path: ['pins'], value: recipe.pins, expected: `at most ${mostPins} pins` }),
  ]);
}

function pinName(number: number): string {
  const letter = (n: number): string => String.fromCharCode(65 + n);
  return number < 26 ? letter(number) : letter(Math.floor(number / 26) - 1) + letter(number % 26);
}

/** Marks a pixel; the pin gets the next free letter unless it is given a name. */
export function addPin(
  recipe: Recipe,
  pin: Omit<Pin, 'name'> & { readonly name?: string },
): Recipe {
  const pins = recipe.pins ?? [];
  const path = ['pins', pins.length];
  const named: Pin = { ...pin, name: pin.name ?? nextPinName(recipe) };
  ensureFits(pinSchema, named, path);
  assertNameIsFree(pins, named.name, [...path, 'name']);
  return { ...recipe, pins: [...pins, named] };
}

export function movePin(recipe: Recipe, name: string, place: Pick<Pin, 'x' | 'y'>): Recipe {
  return withPin(recipe, name, (pin) =>
    pin.x === place.x && pin.y === place.y ? pin : { ...pin, x: place.x, y: place.y },
  );
}

/** Says in words what a pin marks; empty text takes the words away. */
export function labelPin(recipe: Recipe, name: string, label: string): Recipe {
  return withPin(recipe, name, (pin) => {
    if (label === (pin.label ?? '')) return pin;
    const { label: _, ...rest } = pin;
    return label === '' ? rest : { ...rest, label };
  });
}

export function removePin(recipe: Recipe, name: string): Recipe {
  const pins = recipe.pins?.filter((pin) => pin.name !== name);
  if (pins === undefined || pins.length === recipe.pins?.length) return recipe;
  return { ...recipe, pins };
}

function withPin(recipe: Recipe, name: string, change: (pin: Pin) => Pin): Recipe {
  const pins = recipe.pins ?? [];
  const index = pins.findIndex((pin) => pin.name === name);
  const pin = pins[index];
  if (pin === undefined) return recipe;
  const changed = change(pin);
  if (changed === pin) return recipe;
  return { ...recipe, pins: pins.with(index, ensureFits(pinSchema, changed, ['pins', index])) };
}

/** "region-1", or the first such name no region has. */
export function nextRegionName(recipe: Recipe): string {
  return nextName('region', recipe.regions);
}

/** @throws RimlightError 'recipe' - when the region is not valid or its name is taken */
export function addRegion(recipe: Recipe, region: Region): Recipe {
  const regions = recipe.regions ?? [];
  const path = ['regions', regions.length];
  ensureFits(regionSchema, region, path);
  assertNameIsFree(regions, region.name, [...path, 'name']);
  return { ...recipe, regions: [...regions, region] };
}

/** Draws a region anew, keeping its name. @throws RimlightError 'recipe' - when it is not valid */
export function replaceRegion(recipe: Recipe, name: string, region: Region): Recipe {
  const regions = recipe.regions ?? [];
  const index = regions.findIndex((one) => one.name === name);
  if (index < 0) return recipe;
  const drawn = ensureFits(regionSchema, { ...region, name }, ['regions', index]);
  return { ...recipe, regions: regions.with(index, drawn) };
}

/** Removes a region, and strain maps that took it as unstrained. */
export function removeRegion(recipe: Recipe, name: string): Recipe {
  const regions = recipe.regions?.filter((region) => region.name !== name);
  if (regions === undefined || regions.length === recipe.regions?.length) return recipe;
  return withoutDangling({ ...recipe, regions });
}

function nextName(stem: string, entries: readonly { readonly name: string }[] = []): string {
  const taken = new Set(entries.map(({ name }) => name.toLowerCase()));
  for (let number = 1; ; number++) {
    const name = `${stem}-${number}`;
    if (!taken.has(name)) return name;
  }
}
