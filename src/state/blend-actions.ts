/** What the user does to the blend, each one edit of the recipe; a drag is one undo step. */
import { mostChannels } from '../recipe/blend-block';
import { defaults } from '../recipe/default-values';
import { fullChannel } from '../recipe/defaults';
import {
  addBlendChannel,
  removeBlendChannel,
  setBlendChannel,
  setBlendMode,
} from '../recipe/edits';
import { parseMapName } from '../recipe/map-names';
import { bandQuantityUnit } from '../recipe/offered-maps';
import type { BlendChannel, BlendMode, Recipe } from '../recipe/schema';
import { type LimitPair, orderedLimits } from '../science/limits';
import { mapByName } from '../science/map-by-name';
import { sayUndoable } from './undoable';
import type { Workbench } from './workbench';

/** Given to new channels in turn: far apart in hue, none of them dark. */
const channelColours = ['#ff5a4d', '#3fd07a', '#4c8dff', '#ffc83d', '#c77dff', '#3fd6e0'] as const;

export function setMixing(workbench: Workbench, mode: BlendMode): void {
  edit(workbench, 'Mix the blend another way', (now) => setBlendMode(now, mode));
}

/** Another map for a channel; limits that are numbers of another unit give way to percentiles. */
export function setChannelSource(workbench: Workbench, index: number, source: string): void {
  const channel = channelAt(workbench, index);
  if (channel === undefined || channel.source === source) return;
  const isOtherUnit = unitOf(channel.source) !== unitOf(source);
  const { low, high } = defaults.channel;
  edit(workbench, `Blend ${source} in channel ${index + 1}`, (now) =>
    setBlendChannel(now, index, isOtherUnit ? { source, low, high } : { source }),
  );
}

/** Colours chosen in one go are one step. */
export function setChannelColour(workbench: Workbench, index: number, colour: string): void {
  edit(
    workbench,
    `Colour channel ${index + 1}`,
    (now) => setBlendChannel(now, index, { colour }),
    `channel-colour-${index}`,
  );
}

/** @param moved - the limit the hand is on: it stops before the other one */
export function setChannelLimits(
  workbench: Workbench,
  index: number,
  limits: LimitPair,
  moved: 'low' | 'high',
): void {
  const channel = channelAt(workbench, index);
  if (channel === undefined) return;
  const { maps } = workbench.results.getState();
  const map = mapByName((name) => maps.get(name), channel.source);
  const ordered = orderedLimits(limits, moved, map?.values ?? null);
  const before = fullChannel(channel);
  if (ordered === null || (ordered.low === before.low && ordered.high === before.high)) return;
  edit(
    workbench,
    `Set the limits of channel ${index + 1}`,
    (now) => setBlendChannel(now, index, ordered),
    `channel-limits-${index}`,
  );
}

export function setChannelGamma(workbench: Workbench, index: number, gamma: number): void {
  const channel = channelAt(workbench, index);
  if (channel === undefined || fullChannel(channel).gamma === gamma) return;
  edit(
    workbench,
    `Set gamma of channel ${index + 1}`,
    (now) => setBlendChannel(now, index, { gamma }),
    `channel-gamma-${index}`,
  );
}

export function removeChannel(workbench: Workbench, index: number): void {
  const channel = channelAt(workbench, index);
  if (channel === undefined) return;
  edit(workbench, `Take ${channel.source} out of the blend`, (now) =>
    removeBlendChannel(now, index),
  );
  sayUndoable(workbench, `Channel ${index + 1} was taken out of the blend.`);
}

/** A new channel of the first band that has none yet, in a colour no channel has. */
export function addChannel(workbench: Workbench): void {
  const document = workbench.recipe.getState().recipe;
  const source = freeSource(document);
  const taken = new Set(document.blend?.channels.map(({ colour }) => colour.toLowerCase()));
  const colour = channelColours.find((one) => !taken.has(one)) ?? channelColours[0];
  edit(workbench, `Add ${source} to the blend`, (now) => addBlendChannel(now, { source, colour }));
}

/** Whether the blend has room for one more. */
export function canAddChannel({ blend }: Recipe): boolean {
  return (blend?.channels.length ?? 0) < mostChannels;
}

function freeSource(document: Recipe): string {
  const taken = new Set(document.blend?.channels.map(({ source }) => source));
  const candidates = (document.bands ?? []).map(({ name }) => `band.${name}.integral`);
  return candidates.find((source) => !taken.has(source)) ?? candidates[0] ?? 'scan.total';
}

function channelAt({ recipe }: Workbench, index: number): BlendChannel | undefined {
  return recipe.getState().recipe.blend?.channels[index];
}

function unitOf(source: string): string {
  const parsed = parseMapName(source);
  return parsed?.kind === 'band' ? bandQuantityUnit(parsed.quantity) : source;
}

function edit(
  { recipe, notices }: Workbench,
  label: string,
  change: (recipe: Recipe) => Recipe,
  gesture?: string,
): void {
  try {
    recipe.edit(label, change, gesture);
  } catch (error) {
    notices.sayError(error);
  }
}
