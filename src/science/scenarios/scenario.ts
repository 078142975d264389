/**
 * Demo scans with stated physics and known truth: a scenario is planned without noise, then recorded as a detector
 * would. Same name, options and seed: same bytes in every engine.
 */
import { assertUnreachable, RimlightError } from '../../errors';
import { createRandom } from '../numeric/random';
import type { ScanShape } from '../scan';
import {
  expectedSignal,
  heightStream,
  type Landmark,
  type ScenarioOptions,
  type ScenarioPlan,
  type TruthMap,
} from './plan';
import { drawSpikes, readChannel, type Spike, toSixteenBits } from './spectrograph';
import { planTentField } from './tent-field';
import { planTwinLayer } from './twin-layer';

export const scenarioNames = ['tent-field', 'twin-layer'] as const;
export type ScenarioName = (typeof scenarioNames)[number];

/** What the generator knows of a scan that a measurement would have to find out. */
export interface SampleTruth {
  /** "exciton.centre" (eV), "exciton.area" (counts under the peak before the response), "exciton.fwhm" (eV), "A1.shift" (cm-1), "strain.trace" (percent), "height" (nm) … */
  readonly maps: readonly TruthMap[];
  readonly spikes: readonly Spike[];
  /** constants of the model; the unit is in the name */
  readonly constants: Readonly<Record<string, number>>;
  readonly landmarks: readonly Landmark[];
}

/** A made scan as a file holds it; spectral arrays run toward longer wavelength. */
export interface SampleScan {
  readonly name: string;
  readonly seed: number;
  readonly shape: ScanShape;
  /** (ny, nx, nk), C order, channels in ascending wavelength */
  readonly counts: Uint16Array;
  /** (nk), nm in standard air, ascending, not quite uniform */
  readonly wavelengthAirNm: Float64Array;
  /** (ny, nx), nm, with the noise of a height trace */
  readonly heightNm: Float64Array;
  /** from one pixel to the next in x and y, nm */
  readonly pitchNm: number;
  /** nm in standard air, like the axis */
  readonly laserNm: number;
  readonly exposureS: number;
  /** (nk), counts without light */
  readonly darkCounts: Float64Array;
  /** (nk), counts recorded per photon that reaches the detector */
  readonly response: Float64Array;
  readonly truth: SampleTruth;
}

/** Sizes and brightness when nothing else is asked for; exposure and pitch belong to the scenario. */
export const defaultScenarioOptions: ScenarioOptions = {
  seed: 1,
  ny: 64,
  nx: 64,
  nk: 512,
  peakCounts: 800,
};

const LARGEST_SIDE = 4096;
const LARGEST_TOTAL = 1073741824;

/**
 * A scenario before noise: peaks, relief, detector.
 *
 * @throws RimlightError 'usage' - for an unknown name, a size that is no whole number or out of bounds, a seed that is
 * no whole number, or a brightness that is not positive
 */
export function planScenario(name: string, options: Partial<ScenarioOptions> = {}): ScenarioPlan {
  const known = ensureScenarioName(name);
  const complete = { ...defaultScenarioOptions, ...options };
  checkOptions(complete);
  switch (known) {
    case 'tent-field':
      return planTentField(complete);
    case 'twin-layer':
      return planTwinLayer(complete);
    default:
      return assertUnreachable(known);
  }
}

/**
 * A demo scan with its truth.
 *
 * Counts are Poisson(signal × response) + read noise + dark counts + cosmic rays, rounded, cut to 0 … 65535. A pixel's
 * numbers depend on the seed and its place only, not on the order pixels are made in.
 *
 * @param onProgress - told the share done after each row; what it throws stops the work
 * @throws RimlightError 'usage' - as `planScenario`
 */
export function generateScenario(
  name: string,
  options: Partial<ScenarioOptions> = {},
  onProgress?: (share: number) => void,
): SampleScan {
  const { seed } = { ...defaultScenarioOptions, ...options };
  const plan = planScenario(name, options);
  const { counts, spikes } = record(plan, seed, onProgress);
  return {
    name: plan.name,
    seed,
    shape: plan.shape,
    counts,
    wavelengthAirNm: plan.axis.wavelengthAirNm,
    heightNm: traceHeight(plan, seed),
    pitchNm: plan.pitchNm,
    laserNm: plan.laserNm,
    exposureS: plan.exposureS,
    darkCounts: plan.darkCounts,
    response: plan.response,
    truth: {
      maps: truthMaps(plan),
      spikes,
      constants: plan.constants,
      landmarks: plan.landmarks,
    },
  };
}

function record(plan: ScenarioPlan, seed: number, onProgress?: (share: number) => void) {
  const { nx, nk, ny } = plan.shape;
  const counts = new Uint16Array(ny * nx * nk);
  const spikes: Spike[] = [];
  const signal = new Float64Array(nk);
  for (let pixel = 0; pixel < ny * nx; pixel++) {
    const random = createRandom(seed, pixel);
    const start = pixel * nk;
    expectedSignal(plan, pixel, signal);
    for (let k = 0; k < nk; k++) {
      const expected = signal[k] * plan.response[k];
      counts[start + k] = readChannel(random, expected, plan.darkCounts[k], plan.readNoiseCounts);
    }
    const place = { y: Math.floor(pixel / nx), x: pixel % nx, nk };
    for (const spike of drawSpikes(random, plan.hitsPerPixel, place)) {
      counts[start + spike.k] = toSixteenBits(counts[start + spike.k] + spike.counts);
      spikes.push(spike);
    }
    if (place.x === nx - 1) onProgress?.((place.y + 1) / ny);
  }
  return { counts, spikes };
}

function traceHeight(plan: ScenarioPlan, seed: number): Float64Array {
  const random = createRandom(seed, heightStream);
  return plan.heightNm.map((nm) => nm + plan.heightNoiseNm * random.normal());
}

function truthMaps(plan: ScenarioPlan): TruthMap[] {
  const ofPeaks = plan.peaks.flatMap((peak) => [
    { name: `${peak.name}.centre`, unit: 'eV', values: peak.centreEv },
    { name: `${peak.name}.area`, unit: 'counts', values: peak.area },
    { name: `${peak.name}.fwhm`, unit: 'eV', values: peak.fwhmEv },
  ]);
  return [...ofPeaks, ...plan.maps, { name: 'height', unit: 'nm', values: plan.heightNm }];
}

function ensureScenarioName(name: string): ScenarioName {
  const found = scenarioNames.find((known) => known === name);
  if (found !== undefined) return found;
  throw new RimlightError('usage', {
    what: `there is no demo scan called "${name}"`,
    where: '',
    hint: `Choose one of: ${scenarioNames.join(', ')}.`,
  });
}

function checkOptions({ seed, ny, nx, nk, peakCounts }: ScenarioOptions): void {
  const wrong = (what: string, hint: string) =>
    new RimlightError('usage', { what, where: 'demo scan', hint });
  for (const [word, value, least] of [
    ['rows', ny, 1],
    ['columns', nx, 1],
    ['channels', nk, 16],
  ] as const) {
    if (Number.isInteger(value) && value >= least && value <= LARGEST_SIDE) continue;
    throw wrong(
      `${value} is not a possible number of ${word}`,
      `Give a whole number from ${least} to ${LARGEST_SIDE}.`,
    );
  }
  if (ny * nx * nk > LARGEST_TOTAL) {
    throw wrong(
      `${ny} × ${nx} pixels of ${nk} channels are ${ny * nx * nk} values`,
      `Ask for at most ${LARGEST_TOTAL}.`,
    );
  }
  if (!Number.isSafeInteger(seed) || seed < 0) {
    throw wrong(`${seed} is not a possible seed`, 'Give a whole number from 0 to 2⁵³ − 1.');
  }
  if (!(peakCounts > 0 && peakCounts <= 60_000)) {
    throw wrong(
      `${peakCounts} is not a possible brightness`,
      'Give counts per channel above 0 and up to 60000.',
    );
  }
}
