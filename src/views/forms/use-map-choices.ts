/** The maps that can be chosen, as groups of a drop-down list; the same arrays until a name changes. */
import { useMemo } from 'react';
import { type ChoiceGroup, leadChoices } from '../../state/lead-choices';
import { useRecipe, useResults } from '../workbench-context';
import type { ChoiceItems } from './choice';

export interface MapChoices {
  readonly groups: readonly ChoiceGroup[];
  readonly items: readonly ChoiceItems[];
}

export function useMapChoices(): MapChoices {
  const recipe = useRecipe((document) => document);
  const known = useResults((results) => results.maps);
  // As text, since a band that is dragged changes the recipe and not one of these names.
  const text = JSON.stringify(leadChoices(recipe, known));
  return useMemo(() => {
    const groups: readonly ChoiceGroup[] = JSON.parse(text);
    const items = groups.map(({ title, maps }) => ({
      title,
      items: maps.map(({ name, title: words }) => ({ id: name, words })),
    }));
    return { groups, items };
  }, [text]);
}
