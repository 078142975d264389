/** The same results from the command line, to hold the screen against. */
import { execFileSync } from 'node:child_process';
import { mkdtempSync, readdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { decode } from 'fast-png';
import { formatMeasured } from '../../src/science/format';

export const sampleFolder = 'sample-data';

export interface Results {
  /** the value and uncertainty of a map at a pixel, as the screen writes it */
  shown(map: string, pixel: { readonly x: number; readonly y: number }, unit: string): string;
  value(map: string, pixel: { readonly x: number; readonly y: number }): number;
  /** red, green, blue of the blend at a pixel */
  blendAt(pixel: { readonly x: number; readonly y: number }): readonly number[];
}

/** Replays a recipe on the demo scan; its peak model, which takes longest, only where that is asked for. */
export function replay(recipeText: string, { withModel = false } = {}): Results {
  const folder = mkdtempSync(join(tmpdir(), 'rimlight-replay-'));
  try {
    const recipe = join(folder, 'recipe.json');
    const { model, ...rest } = JSON.parse(recipeText);
    writeFileSync(recipe, JSON.stringify(withModel ? { ...rest, model } : rest));
    const out = join(folder, 'out');
    const scan = join(sampleFolder, 'tent-field.h5');
    const call = ['dist/cli/rimlight.js', 'run', '--recipe', recipe, '--out', out, scan];
    execFileSync(process.execPath, [...call, '--only', 'maps,blend']);
    return readResults(join(out, 'tent-field'));
  } finally {
    rmSync(folder, { recursive: true });
  }
}

export const demoRecipe = (): string =>
  readFileSync(join(sampleFolder, 'tent-field.recipe.json'), 'utf8');

const nx = 64;

function readResults(folder: string): Results {
  const maps = new Map<string, Float64Array>();
  for (const name of readdirSync(join(folder, 'maps'))) {
    maps.set(name.replace(/\.npy$/, ''), valuesOf(readFileSync(join(folder, 'maps', name))));
  }
  const blend = decode(readFileSync(join(folder, 'blend.png')));
  const value: Results['value'] = (map, { x, y }) => maps.get(map)?.[y * nx + x] ?? Number.NaN;
  return {
    value,
    shown: (map, pixel, unit) =>
      formatMeasured(value(map, pixel), value(`${map}.err`, pixel), unit),
    blendAt: ({ x, y }) => {
      const at = (y * nx + x) * blend.channels;
      return [...blend.data.slice(at, at + 3)].map(Number);
    },
  };
}

/** Doubles after the header of an npy file, whose length is in its bytes 8 and 9 (NEP 1). */
function valuesOf(file: Buffer): Float64Array {
  const from = 10 + file.readUInt16LE(8);
  const bytes = Uint8Array.from(file.subarray(from));
  return new Float64Array(bytes.buffer);
}
