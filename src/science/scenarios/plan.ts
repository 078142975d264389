/** What a scenario is before any noise: axis, peaks at each pixel, relief, detector. Spectral arrays run as in the file, toward longer wavelength. */
import { atan, exp } from '../numeric/elementary';
import type { ScanShape } from '../scan';

/** One value per pixel of something the generator knows. */
export interface TruthMap {
  /** "exciton.centre", "A1.shift", "strain.trace" … */
  readonly name: string;
  /** "eV", "counts", "cm-1", "percent", "nm" */
  readonly unit: string;
  /** (ny, nx), C order */
  readonly values: Float64Array;
}

/** A pixel worth pinning. */
export interface Landmark {
  readonly label: string;
  readonly y: number;
  readonly x: number;
}

/** A peak at every pixel; each array (ny, nx), C order. */
export interface PeakMaps {
  readonly name: string;
  readonly shape: 'gaussian' | 'lorentzian';
  readonly centreEv: Float64Array;
  /** counts under the peak before the detector's response */
  readonly area: Float64Array;
  readonly fwhmEv: Float64Array;
}

/** The spectrograph's channels, ascending in wavelength, so descending in energy. */
export interface FileAxis {
  /** (nk), nm in standard air */
  readonly wavelengthAirNm: Float64Array;
  /** (nk), eV */
  readonly centresEv: Float64Array;
  /** (nk + 1), eV */
  readonly edgesEv: Float64Array;
}

export interface ScenarioPlan {
  readonly name: string;
  readonly shape: ScanShape;
  readonly pitchNm: number;
  /** nm in standard air, like the axis */
  readonly laserNm: number;
  readonly exposureS: number;
  readonly axis: FileAxis;
  readonly peaks: readonly PeakMaps[];
  /** (nk), counts per channel of scattered light before the response, the same at every pixel */
  readonly floor: Float64Array;
  /** (nk), counts recorded per photon that reaches the detector */
  readonly response: Float64Array;
  /** (nk), counts without any light */
  readonly darkCounts: Float64Array;
  /** standard deviation, counts */
  readonly readNoiseCounts: number;
  /** cosmic-ray hits expected per pixel */
  readonly hitsPerPixel: number;
  /** (ny, nx), nm, without the trace's noise */
  readonly heightNm: Float64Array;
  /** standard deviation of the height trace, nm */
  readonly heightNoiseNm: number;
  /** further truth: strain, Raman shifts */
  readonly maps: readonly TruthMap[];
  /** constants of the model by name with unit: "gauge_meV_per_percent_trace" */
  readonly constants: Readonly<Record<string, number>>;
  readonly landmarks: readonly Landmark[];
}

export interface ScenarioOptions {
  /** whole number; the same seed gives the same bytes everywhere */
  readonly seed: number;
  readonly ny: number;
  readonly nx: number;
  readonly nk: number;
  /** counts expected in the brightest channel of the undisturbed layer, without dark counts */
  readonly peakCounts: number;
}

/** Streams of random numbers: pixels have 0 … ny·nx − 1, these lie beyond any of them. */
export const layoutStream = 1099511627776;
export const heightStream = 2199023255552;

const FOUR_LN_2 = 2.772588722239781;
const GAUSSIAN_HEIGHT = 0.9394372786996513;
const INVERSE_PI = 0.3183098861837907;

/** Counts recorded in the channel at `centreEv` of a Gaussian there of unit area. */
export function brightestShare(
  axis: FileAxis,
  response: Float64Array,
  centreEv: number,
  fwhmEv: number,
): number {
  const below = axis.centresEv.findIndex((ev) => ev < centreEv);
  const widthEv = axis.edgesEv[below] - axis.edgesEv[below + 1];
  return (GAUSSIAN_HEIGHT * widthEv * response[below]) / fwhmEv;
}

/**
 * Expected counts of one pixel before response, dark counts and noise.
 *
 * A Gaussian (many channels wide) is its density at the channel's centre times the channel's width; a Lorentzian is
 * integrated over each channel within ten widths of its centre, where it may be as narrow as a channel.
 *
 * @param pixel - y · nx + x
 * @param out - (nk), overwritten
 */
export function expectedSignal(plan: ScenarioPlan, pixel: number, out: Float64Array): Float64Array {
  out.set(plan.floor);
  for (const peak of plan.peaks) {
    const add = peak.shape === 'gaussian' ? addGaussian : addLorentzian;
    add(out, plan.axis, peak.centreEv[pixel], peak.area[pixel], peak.fwhmEv[pixel]);
  }
  return out;
}

function addGaussian(
  out: Float64Array,
  axis: FileAxis,
  centreEv: number,
  area: number,
  fwhmEv: number,
): void {
  const { centresEv, edgesEv } = axis;
  const scale = (area * GAUSSIAN_HEIGHT) / fwhmEv;
  for (let k = 0; k < out.length; k++) {
    const z = (centresEv[k] - centreEv) / fwhmEv;
    // beyond three full widths less than 2e-11 of the height is left
    if (z < -3 || z > 3) continue;
    out[k] += scale * exp(-FOUR_LN_2 * z * z) * (edgesEv[k] - edgesEv[k + 1]);
  }
}

function addLorentzian(
  out: Float64Array,
  axis: FileAxis,
  centreEv: number,
  area: number,
  fwhmEv: number,
): void {
  const { centresEv, edgesEv } = axis;
  for (let k = 0; k < out.length; k++) {
    const z = (2 * (centresEv[k] - centreEv)) / fwhmEv;
    if (z < -20 || z > 20) {
      const width = (2 * (edgesEv[k] - edgesEv[k + 1])) / fwhmEv;
      out[k] += (area * INVERSE_PI * width) / (1 + z * z);
      continue;
    }
    const upper = atan((2 * (edgesEv[k] - centreEv)) / fwhmEv);
    const lower = atan((2 * (edgesEv[k + 1] - centreEv)) / fwhmEv);
    out[k] += area * INVERSE_PI * (upper - lower);
  }
}
