/** Where the cursor is, in words: a place on the sample, a photon energy in the trade's three units. */
import { airNmFromVacuum, shortestAirNm } from '../science/air';
import type { Medium } from '../science/axis';
import { formatEnergy, formatLength, formatSignificant, withUnit } from '../science/format';
import type { PositionAxis, ScanMeta } from '../science/scan';
import { nmFromEv, shiftCm1FromEv } from '../science/units';

/** "x 0.615 µm  y 0.555 µm"; another quantity under its own name: "gate_volts 1.5 V". */
export function placeInWords(
  meta: ScanMeta,
  pixel: { readonly y: number; readonly x: number },
): string {
  return [positionInWords(meta.x, 'x', pixel.x), positionInWords(meta.y, 'y', pixel.y)]
    .filter((text) => text !== '')
    .join('  ');
}

function positionInWords(axis: PositionAxis, name: string, index: number): string {
  const value = axis.values?.[index] ?? index * axis.pitch;
  if (axis.isLength) return `${name} ${formatLength(value)}`;
  if (axis.unit === 'px') return `${name} ${index}`;
  return `${axis.label} ${withUnit(formatSignificant(value, 4), axis.unit)}`;
}

/** "1.9012 eV · 652.1 nm · 1613 cm⁻¹": the wavelength in the scan's medium, the shift where the laser is known. */
export function energyInWords(energyEv: number, laserEv: number | null, medium: Medium): string {
  if (!(energyEv > 0)) return '';
  const vacuumNm = nmFromEv(energyEv);
  const isAir = medium === 'air' && vacuumNm >= shortestAirNm;
  const nm = isAir ? airNmFromVacuum(vacuumNm) : vacuumNm;
  const parts = [formatEnergy(energyEv), `${nm.toFixed(nm < 2000 ? 1 : 0)} nm`];
  if (laserEv !== null)
    parts.push(`${shiftCm1FromEv(energyEv, laserEv).toFixed(0).replace('-', '−')} cm⁻¹`);
  return parts.join(' · ');
}

/** "96 × 96 px · 15 nm/px · 1024 ch · 594.1 nm" */
export function scanInWords(meta: ScanMeta, medium: Medium): string {
  const { ny, nx, nk } = meta.shape;
  const parts = [`${nx} × ${ny} px`];
  const pitches = [meta.x, meta.y]
    .filter((axis) => axis.isLength)
    .map((axis) => formatLength(axis.pitch));
  if (pitches.length > 0) parts.push(`${[...new Set(pitches)].join(' × ')}/px`);
  parts.push(`${nk} ch`);
  if (meta.laserEv !== null) {
    const vacuumNm = nmFromEv(meta.laserEv);
    const isAir = medium === 'air' && vacuumNm >= shortestAirNm;
    parts.push(`${(isAir ? airNmFromVacuum(vacuumNm) : vacuumNm).toFixed(1)} nm`);
  }
  return parts.join(' · ');
}
