/** What the lead pane shows, put together from the view settings, the recipe and the results. */
import { useMemo } from 'react';
import type { Limits } from '../../science/colour/transfer';
import { mapByName } from '../../science/map-by-name';
import type { DerivedMap } from '../../science/scan';
import { choiceOf, type MapChoice } from '../../state/lead-choices';
import type { ChoiceItems } from '../forms/choice';
import { useMapChoices } from '../forms/use-map-choices';
import { limitsOf } from '../map/map-limits';
import { type MapPicture, useMapImage } from '../map/use-map-image';
import { useResults, useView } from '../workbench-context';
import { scaleTable, shownScale } from './lead-scale';

export interface LeadMap {
  readonly choice: MapChoice;
  readonly items: readonly ChoiceItems[];
  /** null until it is known */
  readonly map: DerivedMap | null;
  readonly image: MapPicture | null;
  /** NaN while there is no map */
  readonly limits: Limits;
  /** the map's own: a scan may hold something else than counts */
  readonly unit: string;
  readonly scale: string;
  readonly table: Uint8Array;
}

const total: MapChoice = { name: 'scan.total', title: 'Sum of all channels', unit: 'counts' };
const unknown: Limits = { low: Number.NaN, high: Number.NaN };

export function useLeadMap(): LeadMap {
  const known = useResults((results) => results.maps);
  const wanted = useView((view) => view.leadMap);
  const low = useView((view) => view.leadLow);
  const high = useView((view) => view.leadHigh);
  const wantedScale = useView((view) => view.colourScale);
  const transfer = useView((view) => view.transfer);

  const { groups, items } = useMapChoices();
  const choice = choiceOf(groups, wanted) ?? choiceOf(groups, total.name) ?? total;
  const map = useMemo(
    () => mapByName((name) => known.get(name), choice.name),
    [known, choice.name],
  );
  const limits = map === null ? unknown : limitsOf(map.values, low, high);
  const scale = shownScale(wantedScale, limits);
  const table = useMemo(() => scaleTable(scale, limits), [scale, limits]);
  const image = useMapImage(map, table, low, high, transfer);
  const unit = map?.unit ?? choice.unit;
  return { choice, items, map, image, limits, unit, scale, table };
}
