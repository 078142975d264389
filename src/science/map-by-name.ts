/** Finds a map by its contract name, those of uncertainties (".err") inside the map they belong to. */
import type { DerivedMap } from './scan';

const errorSuffix = '.err';

/**
 * A map with its values; for "band.tail.integral.err" the uncertainties as values.
 *
 * @param known - the map of a name without ".err"; undefined where there is none
 * @returns null where there is no such map, or where it has no uncertainties
 */
export function mapByName(
  known: (name: string) => DerivedMap | undefined,
  name: string,
): DerivedMap | null {
  if (!name.endsWith(errorSuffix)) return known(name) ?? null;
  const map = known(name.slice(0, -errorSuffix.length));
  if (map === undefined || map.errors === null) return null;
  return { ...map, name, values: map.errors, errors: null };
}
