/** How a scan was read, in one short line: "y·x·k, wavelength nm in air → eV". */
import type { ScanPlan } from '../../io/scan-plan';

export function readingInWords({ resolved, cube }: ScanPlan): string {
  const order = (resolved.order ?? orderOf(cube)).split('').join('·');
  const { kind, unit, medium } = resolved.axis ?? {};
  const inMedium = kind === 'wavelength' && medium !== undefined ? ` in ${medium}` : '';
  const shown = unit === 'cm-1' ? 'cm⁻¹' : (unit ?? 'eV');
  const axis = kind === 'energy' && shown === 'eV' ? 'eV' : `${shown}${inMedium} → eV`;
  return `${order}, ${axis}`;
}

function orderOf({ yAxis, xAxis, kAxis }: ScanPlan['cube']): string {
  const places = [
    { letter: 'y', axis: yAxis },
    { letter: 'x', axis: xAxis },
    { letter: 'k', axis: kAxis },
  ];
  return places
    .filter(({ axis }) => axis >= 0)
    .sort((one, other) => one.axis - other.axis)
    .map(({ letter }) => letter)
    .join('');
}
