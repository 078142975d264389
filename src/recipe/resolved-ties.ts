/** Chains of ties resolved: every tied parameter as a straight line of one that is not tied. */
import { RimlightError } from '../errors';
import type { PlannedTie } from '../science/fit/fit-plan';
import type { NamedTie } from './planned-values';

export interface TieEntry {
  /** "exciton.centre" */
  readonly title: string;
  readonly where: string;
  readonly tie: NamedTie | null;
}

/**
 * @returns for each entry its tie to an entry without one, or null
 * @throws RimlightError 'recipe' - when a tie leads to no entry, or back to itself
 */
export function resolveTies(entries: readonly TieEntry[]): readonly (PlannedTie | null)[] {
  const indices = new Map(entries.map(({ title }, index) => [title, index]));
  return entries.map((entry) => {
    if (entry.tie === null) return null;
    let { to, times, plus } = entry.tie;
    for (let turns = 0; turns <= entries.length; turns++) {
      const index = indices.get(to);
      if (index === undefined) throw wrongTie(entry, `leads to ${to}, which the model has not`);
      const next = entries[index].tie;
      if (next === null) return { to: index, times, plus };
      plus += times * next.plus;
      times *= next.times;
      to = next.to;
    }
    throw wrongTie(entry, 'leads back to itself');
  });
}

function wrongTie({ title, where }: TieEntry, what: string): RimlightError {
  return new RimlightError('recipe', {
    what: `the tie of ${title} ${what}`,
    where,
    hint: 'Tie it to a parameter "COMPONENT.PARAM" that has a value of its own.',
  });
}
