/** What is known of one pixel, as rows of the values column. */
import type { Pixel } from '../../workers/engine';
import { parseMapName } from '../recipe/map-names';
import type { Recipe } from '../recipe/schema';
import type { DerivedMap } from '../science/scan';
import { cm1FromEv, shiftCm1FromEv } from '../science/units';

export interface ValueRow {
  /** contract name of the map */
  readonly name: string;
  /** what it is a property of: a band, a component; "" for the scan itself */
  readonly group: string;
  /** "centroid" */
  readonly label: string;
  readonly value: number;
  /** 1-σ; null where there is none */
  readonly error: number | null;
  readonly unit: string;
}

/** Values of every map at a pixel, in the order given; a pixel outside has none. */
export function valuesAt(maps: readonly DerivedMap[], { y, x }: Pixel): readonly ValueRow[] {
  return maps.flatMap((map) => {
    if (y < 0 || y >= map.ny || x < 0 || x >= map.nx) return [];
    const index = y * map.nx + x;
    const error = map.errors?.[index] ?? null;
    const value = map.values[index] ?? Number.NaN;
    return [{ name: map.name, ...wordsOf(map.name), value, error, unit: map.unit }];
  });
}

/**
 * What a narrow column has no room for: heights, which follow from area and width, how many rounds
 * a fit took, and energies of Raman lines, which are told as shifts.
 */
export function withoutMinor(rows: readonly ValueRow[]): readonly ValueRow[] {
  const names = new Set(rows.map(({ name }) => name));
  return rows.filter(({ name }) => {
    const parsed = parseMapName(name);
    if (parsed?.kind === 'fit-quality') return parsed.quantity === 'chi2r';
    if (parsed?.kind !== 'fit') return true;
    if (parsed.parameter === 'height') return false;
    return parsed.parameter !== 'centre' || !names.has(`fit.${parsed.component}.centre_cm1`);
  });
}

const energies: ReadonlySet<string> = new Set(['centroid', 'median', 'peak_at']);

/**
 * Energies of bands that the recipe gives as Raman shifts, as shifts too; everything else unchanged.
 *
 * @param laserEv - photon energy of the laser; null leaves all in eV
 */
export function withShifts(
  rows: readonly ValueRow[],
  recipe: Recipe,
  laserEv: number | null,
): readonly ValueRow[] {
  if (laserEv === null) return rows;
  const bands = recipe.bands ?? [];
  const raman = new Set(bands.filter(({ unit }) => unit === 'cm-1').map(({ name }) => name));
  return rows.map((row) => {
    const parsed = parseMapName(row.name);
    if (parsed?.kind !== 'band' || !raman.has(parsed.band)) return row;
    const error = row.error === null ? null : cm1FromEv(row.error);
    if (energies.has(parsed.quantity)) {
      return { ...row, value: shiftCm1FromEv(row.value, laserEv), error, unit: 'cm-1' };
    }
    return parsed.quantity === 'spread'
      ? { ...row, value: cm1FromEv(row.value), error, unit: 'cm-1' }
      : row;
  });
}

const quantityWords: Readonly<Record<string, string>> = {
  integral: 'counts',
  peak: 'highest channel',
  peak_at: 'energy of it',
};

/** Tells a component from a band of the same name. */
export const fitSuffix = 'fit';

const fitWords: Readonly<Record<string, string>> = {
  centre_cm1: 'shift',
  needed: 'needed, ΔBIC',
  fwhm_g: 'fwhm, Gaussian',
  fwhm_l: 'fwhm, Lorentzian',
};

/** A map's name in the few words of a narrow column. */
export function wordsOf(name: string): Pick<ValueRow, 'group' | 'label'> {
  const parsed = parseMapName(name);
  if (parsed === null) return { group: '', label: name };
  switch (parsed.kind) {
    case 'scan':
      return { group: '', label: parsed.quantity === 'total' ? 'all channels' : 'height' };
    case 'band':
      return { group: parsed.band, label: quantityWords[parsed.quantity] ?? parsed.quantity };
    case 'fit':
      return {
        group: `${parsed.component} ${fitSuffix}`,
        label: fitWords[parsed.parameter] ?? parsed.parameter,
      };
    case 'fit-quality':
      return {
        group: fitSuffix,
        label: parsed.quantity === 'chi2r' ? 'χ² reduced' : parsed.quantity,
      };
    case 'strain':
      return {
        group: 'strain',
        label: parsed.method === 'pl' ? 'from PL shift' : 'from Raman shift',
      };
    case 'strain-height':
      return { group: 'strain', label: `from height, ${parsed.component}` };
    case 'despike':
      return { group: '', label: 'channels replaced' };
  }
}

/** "tail centroid": a map's name where it stands by itself. */
export function labelOf(name: string): string {
  const { group, label } = wordsOf(name);
  return group === '' ? label : `${group} ${label}`;
}

export interface ValueGroup {
  readonly group: string;
  readonly rows: readonly ValueRow[];
}

/** Rows gathered by what they are a property of, in the order of their first. */
export function grouped(rows: readonly ValueRow[]): readonly ValueGroup[] {
  const groups = new Map<string, ValueRow[]>();
  for (const row of rows) groups.set(row.group, [...(groups.get(row.group) ?? []), row]);
  return [...groups].map(([group, members]) => ({ group, rows: members }));
}
