/** From peaks found in a scan's spectra to a model the user can correct. */
import type { FoundPeak } from '../science/fit/find-peaks';
import { shiftCm1FromEv } from '../science/units';
import type { ModelComponent, PeakModel } from './schema';

/** Lines narrower than this that lie within reach of the laser are taken for Raman lines, eV: 25 cm⁻¹. */
const widestRamanEv = 0.0031;
/** Raman shifts of first and second order in solids and molecules, cm⁻¹ (common practice, no source). */
const ramanReach: readonly [number, number] = [50, 4000];

/**
 * A model of the peaks: Raman lines by their width and place, the luminescence of highest energy as
 * exciton, what lies below it as localised, kept only where needed. Starts are the peaks', bounds
 * leave them room.
 *
 * @param peaks - in any order
 * @param laserEv - null when unknown: then nothing is taken for a Raman line
 */
export function suggestModel(peaks: readonly FoundPeak[], laserEv: number | null): PeakModel {
  const byEnergy = [...peaks].sort((a, b) => b.centreEv - a.centreEv);
  const lines = byEnergy.filter((peak) => isRamanLine(peak, laserEv));
  const bands = byEnergy.filter((peak) => !lines.includes(peak));
  const components: ModelComponent[] = [
    { name: 'floor', shape: 'line' },
    ...bands.map((peak, index) => luminescence(peak, index)),
    ...(laserEv === null ? [] : named(lines.map((peak) => ramanLine(peak, laserEv)))),
  ];
  return { components };
}

/** Whether a peak is narrow enough, and lies where Raman lines lie. */
export function isRamanLine({ fwhmEv, centreEv }: FoundPeak, laserEv: number | null): boolean {
  if (laserEv === null || fwhmEv > widestRamanEv) return false;
  const shift = shiftCm1FromEv(centreEv, laserEv);
  return shift >= ramanReach[0] && shift <= ramanReach[1];
}

function luminescence(peak: FoundPeak, index: number): ModelComponent {
  const shape = 'gaussian';
  const places = { centre: centreOf(peak), fwhm: widthOf(peak) };
  if (index === 0) return { name: 'exciton', role: 'exciton', shape, ...places };
  const name = index === 1 ? 'localised' : `localised-${index}`;
  return { name, role: 'localised', shape, ...places, optional: true };
}

function ramanLine(peak: FoundPeak, laserEv: number): ModelComponent {
  const shift = Math.round(shiftCm1FromEv(peak.centreEv, laserEv));
  return {
    name: `line-${shift}`,
    role: 'raman',
    shape: 'lorentzian',
    centre: centreOf(peak),
    fwhm: widthOf(peak),
  };
}

function centreOf({ centreEv, fwhmEv }: FoundPeak) {
  return {
    start: rounded(centreEv),
    min: rounded(centreEv - 1.5 * fwhmEv),
    max: rounded(centreEv + 1.5 * fwhmEv),
  };
}

function widthOf({ fwhmEv }: FoundPeak) {
  return {
    start: rounded(fwhmEv),
    min: rounded(0.3 * fwhmEv),
    max: rounded(3 * fwhmEv),
  };
}

/** Two lines at one rounded shift need two names. */
function named(components: readonly ModelComponent[]): readonly ModelComponent[] {
  const taken = new Map<string, number>();
  return components.map((component) => {
    const before = taken.get(component.name) ?? 0;
    taken.set(component.name, before + 1);
    return before === 0 ? component : { ...component, name: `${component.name}-${before + 1}` };
  });
}

/** Six decimals of an eV: a thousandth of what any channel resolves. */
function rounded(energyEv: number): number {
  return Number(energyEv.toFixed(6));
}
