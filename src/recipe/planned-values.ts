/** One parameter of the model as its value, bounds and tie in eV or counts, whatever unit it was written in. */
import { RimlightError } from '../errors';
import { shortestAirNm, vacuumNmFromAir } from '../science/air';
import type { Medium } from '../science/axis';
import { evFromCm1, evFromNm, evFromShiftCm1 } from '../science/units';
import { defaults } from './default-values';
import type { ParameterSpec } from './schema';

/** What a parameter's value is on: widths and places are converted, the rest is kept. */
export type ValueKind = 'centre' | 'width' | 'share' | 'plain';

export interface Conversion {
  readonly kind: ValueKind;
  readonly laserEv: number | null;
  readonly medium: Medium;
  /** named in errors: `model.components[1] "A1", centre` */
  readonly where: string;
}

/** A tie still by name; value = times × other + plus. */
export interface NamedTie {
  readonly to: string;
  readonly times: number;
  readonly plus: number;
}

export interface ConvertedValue {
  readonly start: number | null;
  /** null: none was given */
  readonly min: number | null;
  readonly max: number | null;
  readonly isFixed: boolean;
  readonly tie: NamedTie | null;
}

type FullSpec = Exclude<ParameterSpec, number>;

/**
 * Converts a parameter as written. Bounds of a unit that runs against energy (nm, cm-1 of a centre) change places.
 *
 * @throws RimlightError 'recipe' - for a Raman shift without a laser, a value without a photon energy,
 * and a tie that is no straight line in energy
 */
export function convertValue(
  spec: ParameterSpec | undefined,
  conversion: Conversion,
): ConvertedValue {
  const given: FullSpec = typeof spec === 'number' ? { start: spec } : (spec ?? {});
  const unit = given.unit ?? defaults.parameter.unit;
  const toEv = (value: number): number => energyOf(value, unit, conversion);
  const convert = (value: number | undefined): number | null =>
    value === undefined ? null : toEv(value);
  const isTurned = conversion.kind === 'centre' && (unit === 'nm' || unit === 'cm-1');
  const [low, high] = isTurned ? [given.max, given.min] : [given.min, given.max];
  return {
    start: convert(given.start),
    min: convert(low),
    max: convert(high),
    isFixed: given.fixed === true,
    tie: given.tie === undefined ? null : tieOf(given.tie, unit, conversion),
  };
}

function energyOf(value: number, unit: string, conversion: Conversion): number {
  const { kind, laserEv, medium, where } = conversion;
  if (kind !== 'centre' && kind !== 'width') return value;
  if (unit === 'meV') return value / 1000;
  if (unit === 'cm-1' && kind === 'width') return evFromCm1(value);
  if (unit === 'cm-1') {
    const energyEv = evFromShiftCm1(value, laserOf(laserEv, where));
    if (energyEv > 0) return energyEv;
    throw wrong(
      `a Raman shift of ${value} cm-1 is more than the laser's photons have`,
      where,
      'Check the value and scan.laser.',
    );
  }
  if (unit === 'nm') {
    if (value > 0 && (medium === 'vacuum' || value >= shortestAirNm)) {
      return evFromNm(medium === 'air' ? vacuumNmFromAir(value) : value);
    }
    throw wrong(
      `${value} nm is no wavelength in ${medium}`,
      where,
      'Check the value and its unit, or give it in eV.',
    );
  }
  return value;
}

/** other × times + plus, which is meant in the parameter's own unit, as a line in energy. */
function tieOf(
  tie: NonNullable<FullSpec['tie']>,
  unit: string,
  { kind, laserEv, where }: Conversion,
): NamedTie {
  const { to } = tie;
  const times = tie.times ?? defaults.tie.times;
  const plus = tie.plus ?? defaults.tie.plus;
  if (kind === 'centre' && unit === 'cm-1') {
    // shift = times (laser − E) + plus
    const laser = laserOf(laserEv, where);
    return { to, times, plus: laser * (1 - times) - evFromCm1(plus) };
  }
  if (kind === 'centre' && unit === 'nm' && (times !== 1 || plus !== 0)) {
    throw wrong(
      'a tie in nm is no straight line in energy',
      where,
      'Give the tie, with its parameter, in eV, meV or cm-1.',
    );
  }
  const scale = kind === 'width' && unit === 'cm-1' ? evFromCm1(1) : unit === 'meV' ? 1e-3 : 1;
  return { to, times, plus: kind === 'share' || kind === 'plain' ? plus : plus * scale };
}

function laserOf(laserEv: number | null, where: string): number {
  if (laserEv !== null) return laserEv;
  throw wrong(
    'Raman shifts in cm-1 need the laser, which is not known',
    where,
    'State scan.laser, or give the value in eV.',
  );
}

function wrong(what: string, where: string, hint: string): RimlightError {
  return new RimlightError('recipe', { what, where, hint });
}
