/** What the user does to the lead map: which one it is, and how it is coloured. Nothing here moves a number. */
import type { Transfer } from '../science/colour/transfer';
import { type LimitPair, orderedLimits } from '../science/limits';
import { mapByName } from '../science/map-by-name';
import { leadChoices } from './lead-choices';
import type { Workbench } from './workbench';

const energyLimits: LimitPair = { low: 'p2', high: 'p98' };
const countLimits: LimitPair = { low: 'p0.5', high: 'p99.5' };

/** Limits a map starts with: narrow for energies, whose few outliers are noise of dim pixels; nearly all for the rest. */
export function startingLimits(mapName: string): LimitPair {
  return /\.(?:centroid|median|spread|peak_at|centre|fwhm)$/.test(mapName)
    ? energyLimits
    : countLimits;
}

/** Shows a map in the lead pane, with the limits such a map starts with. */
export function showLeadMap({ view }: Workbench, name: string): void {
  if (view.getState().leadMap === name) return;
  const { low, high } = startingLimits(name);
  view.setState({ leadMap: name, leadLow: low, leadHigh: high });
}

/** Shows the map so many places further in the list of choices, round its end. */
export function stepLeadMap(workbench: Workbench, by: number): void {
  const { recipe, results, view } = workbench;
  const groups = leadChoices(recipe.getState().recipe, results.getState().maps);
  const names = groups.flatMap(({ maps }) => maps.map(({ name }) => name));
  if (names.length === 0) return;
  const shown = names.indexOf(view.getState().leadMap.replace(/\.err$/, ''));
  const next = names[(Math.max(shown, 0) + by + names.length) % names.length];
  if (next !== undefined) showLeadMap(workbench, next);
}

/** Limits from the fields; a pair whose low limit is not below the high one is not taken. */
export function setLeadLimits(
  { view, results }: Workbench,
  limits: LimitPair,
  moved: 'low' | 'high',
): void {
  const { maps } = results.getState();
  const map = mapByName((name) => maps.get(name), view.getState().leadMap);
  const ordered = orderedLimits(limits, moved, map?.values ?? null);
  if (ordered !== null) view.setState({ leadLow: ordered.low, leadHigh: ordered.high });
}

export function setLeadColours({ view }: Workbench, colourScale: string): void {
  view.setState({ colourScale });
}

export function setLeadTransfer({ view }: Workbench, transfer: Transfer): void {
  view.setState({ transfer });
}

/** Shows the 1-σ uncertainty of the lead map, or the map again. */
export function toggleLeadError(workbench: Workbench): void {
  const { leadMap } = workbench.view.getState();
  const isError = leadMap.endsWith('.err');
  showLeadMap(workbench, isError ? leadMap.replace(/\.err$/, '') : `${leadMap}.err`);
}
