/**
 * Colour scales as tables of 256 colours: sequential ones for any map, single-hue ramps for hung
 * maps and blend channels, diverging ones for maps with a meaningful zero. Even in perception,
 * readable without colour vision (lightness runs one way along an arm), never a rainbow.
 */
import {
  interpolateCividis,
  interpolateInferno,
  interpolateMagma,
  interpolateViridis,
} from 'd3-scale-chromatic';
import { RimlightError } from '../../errors';
import { divergingArms, divergingTable, isDivergingName } from './diverging-scales';
import type { Oklab } from './oklab';
import { linearFromOklab, oklabFromBytes } from './oklab';
import type { RgbBytes } from './srgb';
import { bytesFromLinear, isHexColour, parseHexColour } from './srgb';

/** `sequential`: dark for little, light for much; `ramp`: black to one colour; `diverging`: two hues away from a zero. */
export type ScaleKind = 'sequential' | 'ramp' | 'diverging';

export interface ColourScale {
  /** "viridis", "blue-orange", or the colour of a ramp: "#ff5a4d" */
  readonly name: string;
  readonly kind: ScaleKind;
  /** (256 × 3) red, green, blue of each entry, low to high; shared, not to be written to */
  readonly table: Uint8Array;
}

/** Entries of a colour table. */
export const tableSize = 256;

const sequential: Readonly<Record<string, () => Uint8Array>> = {
  viridis: () => tableFromText(interpolateViridis),
  cividis: () => tableFromText(interpolateCividis),
  magma: () => tableFromText(interpolateMagma),
  inferno: () => tableFromText(interpolateInferno),
  grey: () => rampTable([255, 255, 255]),
};

/** Every scale that has a name, in the order they are offered. */
export const namedScales: readonly { readonly name: string; readonly kind: ScaleKind }[] = [
  ...Object.keys(sequential).map((name) => ({ name, kind: 'sequential' as const })),
  ...Object.keys(divergingArms).map((name) => ({ name, kind: 'diverging' as const })),
];

const tables = new Map<string, Uint8Array>();

/**
 * A colour scale by name; "#rrggbb" gives the single-hue ramp from black to that colour.
 *
 * @param name - one of `namedScales`, or a colour
 * @param zeroShare - diverging scales only: where zero lies between low (0) and high (1); it may lie outside
 * @throws RimlightError 'recipe' - when there is no such scale
 */
export function colourScale(name: string, zeroShare = 0.5): ColourScale {
  if (isHexColour(name)) {
    const build = () => rampTable(parseHexColour(name));
    return { name, kind: 'ramp', table: kept(name.toLowerCase(), build) };
  }
  if (isDivergingName(name)) {
    return { name, kind: 'diverging', table: divergingTable(name, zeroShare) };
  }
  const build = Object.hasOwn(sequential, name) ? sequential[name] : undefined;
  if (build === undefined) throw unknownScale(name);
  return { name, kind: 'sequential', table: kept(name, build) };
}

/**
 * Black to a colour in equal steps of OKLab, its hue kept.
 *
 * OKLab is the cube root of light (Ottosson 2020), so the step at share t has t³ of the colour's
 * light: the same tone curve as a channel's in a blend, where it therefore looks the same.
 *
 * @returns (256 × 3)
 */
function rampTable(colour: RgbBytes): Uint8Array {
  const end = oklabFromBytes(colour);
  return tableFromOklab((share) => ({
    lightness: share * end.lightness,
    a: share * end.a,
    b: share * end.b,
  }));
}

function tableFromOklab(colourAt: (share: number) => Oklab): Uint8Array {
  const table = new Uint8Array(3 * tableSize);
  for (let i = 0; i < tableSize; i++) {
    table.set(bytesFromLinear(linearFromOklab(colourAt(i / (tableSize - 1)))), 3 * i);
  }
  return table;
}

/** Entries as the scale library writes them: "#440154" or "rgb(0, 32, 81)". */
function tableFromText(textAt: (share: number) => string): Uint8Array {
  const table = new Uint8Array(3 * tableSize);
  for (let i = 0; i < tableSize; i++) {
    const text = textAt(i / (tableSize - 1));
    table.set(
      isHexColour(text) ? parseHexColour(text) : (text.match(/\d+/g) ?? []).map(Number),
      3 * i,
    );
  }
  return table;
}

const keptAtMost = 64;

function kept(key: string, build: () => Uint8Array): Uint8Array {
  const known = tables.get(key);
  if (known !== undefined) return known;
  // dragging in a colour field asks for hundreds of ramps
  if (tables.size >= keptAtMost) tables.clear();
  const table = build();
  tables.set(key, table);
  return table;
}

function unknownScale(name: string): RimlightError {
  return new RimlightError('recipe', {
    what: `there is no colour scale "${name}"`,
    where: '',
    hint: `Use one of ${namedScales.map((scale) => scale.name).join(', ')}, or a colour such as "#ff5a4d".`,
  });
}
