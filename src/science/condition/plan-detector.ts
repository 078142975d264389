/** Offset, response and calibration in a chain: what speaks of the detector. */
import { formatSignificant } from '../format';
import { calibratedAxis, fitCalibration, onAxis } from './calibrate';
import type { StepOf } from './chain-step';
import { type Grid, rowsOf } from './conditioned';
import { assertOffset, subtractDark, subtractOffset } from './offset';
import { counted, onlySlab, planOf } from './plan-base';
import type { PlannedReference } from './planned-reference';
import { divideByResponse, type ResponseOnAxis, responseOnAxis } from './response';
import type { StepPlace } from './step-errors';
import type { PlannedStep } from './step-plan';

/** @throws RimlightError 'recipe' - for an offset that is no number */
export function planOffset(
  dark: number | PlannedReference,
  grid: Grid,
  place: StepPlace,
): PlannedStep {
  if (typeof dark === 'number') {
    assertOffset(dark, place);
    return planOf(place, grid, {
      isOfDetector: true,
      apply: (slab, { y0, y1 }) => onlySlab(subtractOffset(rowsOf(slab, y0, y1), dark)),
      report: () => ({ place, line: `${dark} counts off every channel`, warnings: [] }),
    });
  }
  const what = dark.kind === 'cube' ? 'off each pixel' : 'off all pixels alike';
  const noise = dark.hasNoise ? 'its noise added' : 'its noise not known';
  return planOf(place, grid, {
    isOfDetector: true,
    apply: (slab, rows) => {
      return onlySlab(subtractDark(rowsOf(slab, rows.y0, rows.y1), dark.at(rows)));
    },
    report: () => ({ place, line: `${dark.name} ${what}, ${noise}`, warnings: [] }),
  });
}

/** @throws RimlightError 'recipe' - see `responseOnAxis` */
export function planResponse(
  { curve }: StepOf<'response'>,
  grid: Grid,
  place: StepPlace,
): PlannedStep {
  const found = responseOnAxis(curve, grid.axis, place);
  return planOf(place, grid, {
    isOfDetector: true,
    apply: (slab, { y0, y1 }) => onlySlab(divideByResponse(rowsOf(slab, y0, y1), found.values)),
    report: () => ({ place, line: responseLine(found), warnings: responseWarnings(found) }),
  });
}

function responseLine({
  values,
  isPercent,
  outsideChannels,
  blindChannels,
}: ResponseOnAxis): string {
  const known = values.filter((value) => !Number.isNaN(value));
  const percent = (value: number): string => formatSignificant(100 * value, 3);
  const range = `${percent(Math.min(...known))} to ${percent(Math.max(...known))} %`;
  const given = isPercent ? 'given in percent' : 'given as fractions';
  const lost = outsideChannels + blindChannels;
  const rest = lost === 0 ? '' : `; ${counted(lost, 'channel')} without response: no data`;
  return `divided by ${range}, ${given}${rest}`;
}

function responseWarnings({ faintChannels, outsideChannels }: ResponseOnAxis): string[] {
  const warnings: string[] = [];
  if (faintChannels > 0) {
    warnings.push(
      `In ${counted(faintChannels, 'channel')} the response is below a tenth of its maximum: what is drawn there is mostly noise.`,
    );
  }
  if (outsideChannels > 0) {
    warnings.push(
      `The curve does not cover ${counted(outsideChannels, 'channel')}: no data there, nothing is extrapolated.`,
    );
  }
  return warnings;
}

/** @throws RimlightError 'recipe' - see `fitCalibration` and `calibratedAxis` */
export function planCalibrate(
  { points, degree, unit, medium }: StepOf<'calibrate'>,
  grid: Grid,
  place: StepPlace,
): PlannedStep {
  const calibration = fitCalibration(points, degree, place);
  const scale = unit === 'nm' ? { unit, medium } : { unit, laserEv: grid.laserEv };
  const axis = calibratedAxis(grid.axis, calibration, scale, place);
  const shown = unit === 'nm' ? 'nm' : 'cm⁻¹';
  const { rms, leaveOneOutRms } = calibration;
  const leftOut = Number.isNaN(leaveOneOutRms)
    ? 'no points to spare'
    : `${formatSignificant(leaveOneOutRms, 2)} ${shown} left out in turn`;
  return planOf(place, grid, {
    after: { ...grid, axis },
    isOfDetector: true,
    apply: (slab, { y0, y1 }) => onlySlab(onAxis(rowsOf(slab, y0, y1), axis)),
    report: () => ({
      place,
      line: `${counted(points.length, 'point')}, degree ${degree}: ${formatSignificant(rms, 2)} ${shown} rms, ${leftOut}`,
      warnings: [],
    }),
  });
}
