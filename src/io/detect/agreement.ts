/**
 * Several spectral axes in one file check one another: wavenumber + shift is the laser's wavenumber
 * at every channel; 10⁷/λ against wavenumber tells air from vacuum.
 */
import type { Medium } from '../../science/axis';
import { energyOnScale } from '../../science/axis';
import { cm1FromEv } from '../../science/units';
import type { Role } from './roles';
import type { Vector } from './vectors';

export interface Agreement {
  /** the laser's wavenumber, cm⁻¹, from two axes of the file; null when they do not tell */
  readonly laser: { readonly cm1: number; readonly evidence: string } | null;
  readonly medium: { readonly value: Medium; readonly evidence: string } | null;
  /** vectors named as wavenumbers that another axis proves to be absolute */
  readonly absolute: ReadonlyMap<Vector, string>;
}

export interface RoledVector {
  readonly vector: Vector;
  readonly role: Role;
}

/** How far rounding may carry two axes apart, as a share of the step between channels. */
const agreementShare = 0.15;

/** @param candidates - vectors of one file and one length */
export function findAgreement(candidates: readonly RoledVector[]): Agreement {
  const shift = pick(candidates, 'shift');
  const wavelength = pick(candidates, 'wavelength');
  const energies = candidates.filter(({ role }) => isScale(role, 'energy'));
  const wavenumbers = candidates.filter(({ role }) => isScale(role, 'cm-1?'));
  const absolute = new Map<Vector, string>();
  let laser: Agreement['laser'] = null;
  let medium: Agreement['medium'] = null;

  for (const { vector: wavenumber } of wavenumbers) {
    const others: readonly (readonly [Vector | null, (value: number) => number])[] = [
      ...energies.map(({ vector, role }) => [vector, inCm1(role)] as const),
      [wavelength?.vector ?? null, (nm: number) => 1e7 / nm],
    ];
    for (const [other, convert] of others) {
      if (other === null || !isSame(wavenumber.values, other.values, convert)) continue;
      absolute.set(wavenumber, `the same light as ${other.label}, so absolute`);
    }
    const sum = shift === null ? null : constantSum(wavenumber.values, shift.vector.values);
    if (shift !== null && sum !== null && sum > 1000) {
      const evidence = `${wavenumber.label} + ${shift.vector.label} is ${sum.toFixed(2)} cm⁻¹ at every channel`;
      absolute.set(wavenumber, evidence);
      laser = { cm1: sum, evidence };
    }
    if (wavelength !== null) medium = mediumBetween(wavelength, wavenumber) ?? medium;
  }
  if (laser === null && shift !== null && wavelength !== null) {
    const found = laserFromWavelength(wavelength, shift.vector);
    if (found !== null) {
      laser = { cm1: found.cm1, evidence: found.evidence };
      medium = found.medium === null ? medium : { value: found.medium, evidence: found.evidence };
    }
  }
  return { laser, medium, absolute };
}

function isScale(role: Role, kind: string): boolean {
  return role.kind === 'scale' && role.scale.kind === kind;
}

function pick(candidates: readonly RoledVector[], kind: string): RoledVector | null {
  return candidates.find(({ role }) => isScale(role, kind)) ?? null;
}

function inCm1(role: Role): (value: number) => number {
  const unit = role.kind === 'scale' && role.scale.unit === 'meV' ? 'meV' : 'eV';
  return (value) => cm1FromEv(energyOnScale(value, { kind: 'energy', unit }));
}

function cm1Of({ vector, role }: RoledVector, medium: Medium): Float64Array {
  const unit = role.kind === 'scale' ? role.scale.unit : 'nm';
  const scale = unit === 'um' || unit === 'angstrom' ? unit : 'nm';
  return vector.values.map((value) =>
    value > 0
      ? cm1FromEv(energyOnScale(value, { kind: 'wavelength', unit: scale, medium }))
      : Number.NaN,
  );
}

/** Median sum of two axes when it is the same at every channel but for rounding; null otherwise. */
function constantSum(a: Float64Array, b: Float64Array): number | null {
  const { median, spread, step, count } = sums(a, b, 1);
  return count >= 3 && spread < agreementShare * step ? median : null;
}

/**
 * How two axes add up: median of a + sign·b, its rms about it, and the step of a between channels.
 */
function sums(
  a: Float64Array,
  b: Float64Array,
  sign: 1 | -1,
): { median: number; spread: number; step: number; count: number } {
  const found = Array.from(a, (value, k) => value + sign * b[k]).filter(Number.isFinite);
  const sorted = [...found].sort((p, q) => p - q);
  const median = sorted[sorted.length >> 1] ?? Number.NaN;
  const square = found.reduce((total, value) => total + (value - median) * (value - median), 0);
  const finite = a.filter(Number.isFinite);
  const step =
    Math.abs((finite.at(-1) ?? 0) - (finite.at(0) ?? 0)) / Math.max(finite.length - 1, 1);
  return {
    median,
    spread: Math.sqrt(square / Math.max(found.length, 1)),
    step,
    count: found.length,
  };
}

function isSame(a: Float64Array, b: Float64Array, convert: (value: number) => number): boolean {
  const { median, spread, step, count } = sums(a, b.map(convert), -1);
  // 10⁷/λ in air stands a nearly constant 4 cm⁻¹ off and still is the same light.
  return count >= 3 && spread < agreementShare * step * 3 && Math.abs(median) < Math.max(step, 8);
}

/** Which medium makes 10⁷/λ the file's own wavenumbers; null when neither or both do. */
function mediumBetween(wavelength: RoledVector, wavenumber: Vector): Agreement['medium'] {
  const offBy = (medium: Medium): number => {
    const { median, spread } = sums(wavenumber.values, cm1Of(wavelength, medium), -1);
    return Math.abs(median) + spread;
  };
  const air = offBy('air');
  const vacuum = offBy('vacuum');
  const { step } = sums(wavenumber.values, wavenumber.values, -1);
  if (!(Math.min(air, vacuum) < step) || Math.max(air, vacuum) < 4 * Math.min(air, vacuum))
    return null;
  const value = air < vacuum ? 'air' : 'vacuum';
  const how =
    value === 'air' ? '10⁷/(n λ), corrected for air' : '10⁷/λ, without a correction for air';
  return { value, evidence: `${wavenumber.label} is ${how} of ${wavelength.vector.label}` };
}

function laserFromWavelength(
  wavelength: RoledVector,
  shift: Vector,
): { cm1: number; medium: Medium | null; evidence: string } | null {
  const of = (medium: Medium) => sums(cm1Of(wavelength, medium), shift.values, 1);
  const air = of('air');
  const vacuum = of('vacuum');
  const best = air.spread < vacuum.spread ? air : vacuum;
  const worst = air.spread < vacuum.spread ? vacuum : air;
  if (best.count < 3 || !(best.spread < agreementShare * best.step)) return null;
  const medium = best === air ? 'air' : 'vacuum';
  const isTold = worst.spread > 3 * best.spread;
  const evidence = `10⁷/${wavelength.vector.label} + ${shift.label} is ${best.median.toFixed(2)} cm⁻¹ at every channel${
    isTold ? `, with wavelengths in ${medium}` : ''
  }`;
  // Where the two media fit alike, the arithmetic without air is the one files are written with.
  return isTold
    ? { cm1: best.median, medium, evidence }
    : { cm1: vacuum.median, medium: null, evidence };
}
