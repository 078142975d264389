/** What the user does to bands, each one edit of the recipe. */
import { energyToBandUnit } from '../recipe/band-energies';
import {
  addBand,
  moveBandEdges,
  nextBandName,
  removeBand,
  renameBand,
  setBandFloor,
} from '../recipe/edits';
import { parseMapName } from '../recipe/map-names';
import type { RecipeBand } from '../recipe/schema';
import type { BandFloor } from '../science/bands/band';
import { sayUndoable } from './undoable';
import type { Workbench } from './workbench';

export function selectBand({ view }: Workbench, name: string): void {
  view.setState({ selection: { kind: 'band', name } });
}

/** A new band in eV, named, selected. */
export function addBandBetween(workbench: Workbench, oneEv: number, otherEv: number): void {
  const name = nextBandName(workbench.recipe.getState().recipe);
  const from = rounded(Math.min(oneEv, otherEv), 'eV');
  const to = rounded(Math.max(oneEv, otherEv), 'eV');
  workbench.recipe.edit(`Add band ${name}`, (recipe) =>
    addBand(recipe, { name, from, to, unit: 'eV' }),
  );
  selectBand(workbench, name);
}

/** Moves the ends of a band to energies, kept in the band's own unit; one gesture is one undo step. */
export function moveBandEnds(
  workbench: Workbench,
  band: { readonly name: string },
  ends: { readonly fromEv: number; readonly toEv: number },
): void {
  const { session, recipe } = workbench;
  const document = recipe.getState().recipe;
  const written = document.bands?.find(({ name }) => name === band.name);
  const laserEv = session.getState().scan?.open.plan.meta.laserEv ?? null;
  if (written === undefined) return;
  const medium = document.scan?.axis?.medium ?? 'air';
  const inUnit = (ev: number): number =>
    rounded(energyToBandUnit(ev, written.unit, laserEv, medium), written.unit);
  const one = inUnit(ends.fromEv);
  const other = inUnit(ends.toEv);
  recipe.edit(
    `Move band ${band.name}`,
    (now) => moveBandEdges(now, band.name, Math.min(one, other), Math.max(one, other)),
    `move-${band.name}`,
  );
}

export function deleteBand(workbench: Workbench, name: string): void {
  const { recipe, view } = workbench;
  recipe.edit(`Delete band ${name}`, (now) => removeBand(now, name));
  const lead = parseMapName(view.getState().leadMap);
  if (lead?.kind === 'band' && lead.band === name) view.setState({ leadMap: 'scan.total' });
  view.setState({ selection: { kind: 'blend' } });
  sayUndoable(workbench, `Band ${name} was deleted.`);
}

export function setBandName(workbench: Workbench, from: string, to: string): void {
  const { recipe, view } = workbench;
  if (from === to) return;
  recipe.edit(`Rename band ${from}`, (now) => renameBand(now, from, to));
  const { leadMap } = view.getState();
  const lead = parseMapName(leadMap);
  if (lead?.kind === 'band' && lead.band === from) {
    view.setState({ leadMap: leadMap.replace(`band.${from}.`, `band.${to}.`) });
  }
  selectBand(workbench, to);
}

/** Exact ends from the settings column, in the band's own unit. */
export function setBandEnds(workbench: Workbench, name: string, from: number, to: number): void {
  if (!(from !== to)) return;
  workbench.recipe.edit(`Move band ${name}`, (now) =>
    moveBandEdges(now, name, Math.min(from, to), Math.max(from, to)),
  );
}

export function setFloor(workbench: Workbench, name: string, floor: BandFloor): void {
  workbench.recipe.edit(`Set the floor of band ${name}`, (now) => setBandFloor(now, name, floor));
}

/** Digits a hand can mean: a recipe with 17 of them reads badly and means no more. */
function rounded(value: number, unit: RecipeBand['unit']): number {
  const decimals = unit === 'eV' ? 5 : unit === 'meV' ? 2 : 2;
  return Number(value.toFixed(decimals));
}
