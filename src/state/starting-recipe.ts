/** The recipe a fresh scan begins with: three bands that share out its light, and their blend. */
import type { ScanOverview } from '../../workers/engine';
import type { ScanChoices } from '../io/scan-choices';
import { emptyRecipe } from '../recipe/defaults';
import { setScanChoices } from '../recipe/edits';
import type { Recipe } from '../recipe/schema';
import { startingBands } from '../science/starting-bands';

const names = ['low', 'middle', 'high'] as const;
/** The wireframe's first three channel colours, in order of energy. */
const colours = ['#ff5a4d', '#3fd07a', '#4c8dff'] as const;

export function startingRecipe(overview: ScanOverview, choices: ScanChoices): Recipe {
  const { meta, meanSpectrum } = overview;
  const places = startingBands(meta.axis, meanSpectrum, names.length);
  const spanEv = (places.at(-1)?.toEv ?? 1) - (places[0]?.fromEv ?? 0);
  const decimals = spanEv < 0.02 ? 5 : 4;
  const bands = names.map((name, index) => ({
    name,
    from: rounded(places[index]?.fromEv ?? 0, decimals),
    to: rounded(places[index]?.toEv ?? 0, decimals),
    unit: 'eV' as const,
  }));
  const channels = names.map((name, index) => ({
    source: `band.${name}.integral`,
    colour: colours[index] ?? '#ffffff',
  }));
  const recipe = setScanChoices(emptyRecipe(titleOf(meta.name)), choices);
  return { ...recipe, bands, blend: { mode: 'additive', channels } };
}

function titleOf(fileName: string): string {
  return fileName.replace(/\.[^.]+$/, '');
}

function rounded(value: number, decimals: number): number {
  return Number(value.toFixed(decimals));
}
