/**
 * `twin-layer`: a MoSe₂/WSe₂ heterobilayer with bubbles under it, seen at 785 nm with a 20 nm pitch.
 *
 * Stretching over a bubble pulls the interlayer emission from 1.446 eV down toward 1.36 eV at its top, so that the
 * pixels that emit at one energy form a ring, smaller the lower the energy. The emission ends where a silicon
 * detector does. Numbers without a source are our choice for this invented sample.
 */
import { vacuumNmFromAir } from '../air';
import { exp } from '../numeric/elementary';
import { createRandom } from '../numeric/random';
import type { ScanShape } from '../scan';
import { evFromNm } from '../units';
import { bestPixel } from './landmarks';
import {
  brightestShare,
  type Landmark,
  layoutStream,
  type ScenarioOptions,
  type ScenarioPlan,
} from './plan';
import {
  placeBells,
  type Relief,
  reliefHeightNm,
  squaredDistance,
  strainTracePercent,
} from './relief';
import { makeDarkCounts, makeFileAxis } from './spectrograph';
import { makeLandscape } from './unevenness';

const PITCH_NM = 20;
/** Near the MoSe₂ exciton, so that the pair is pumped well. */
const LASER_AIR_NM = 785;
const INTERLAYER_EV = 1.446;
const INTERLAYER_FWHM_EV = 0.024;
/** The moiré and the ground vary without any strain; standard deviation. */
const DISORDER_EV = 0.0015;
const GAUGE_EV_PER_PERCENT_TRACE = -0.055;
/** between the two layers' 0.19 and 0.23 (from memory) */
const POISSON_RATIO = 0.21;
const READ_NOISE_COUNTS = 3.2;

export function planTwinLayer(options: ScenarioOptions): ScenarioPlan {
  const { seed, ny, nx, nk } = options;
  const random = createRandom(seed, layoutStream);
  // one height-to-radius ratio per material pair (Khestanova et al., Nat. Commun. 7, 12587 (2016)), here 0.11 of 2.4 s
  const bells = placeBells(random, {
    widthNm: nx * PITCH_NM,
    depthNm: ny * PITCH_NM,
    spacingNm: 620,
    jitterNm: 60,
    sigmaNm: [105, 160],
    steepness: [0.24, 0.28],
    occupied: 0.92,
  });
  const relief: Relief = { bells, ridges: [], poissonRatio: POISSON_RATIO };
  const at = (quantity: (relief: Relief, xNm: number, yNm: number) => number) =>
    Float64Array.from({ length: ny * nx }, (_, i) =>
      quantity(relief, (i % nx) * PITCH_NM, Math.floor(i / nx) * PITCH_NM),
    );
  const height = at(reliefHeightNm);
  const trace = at(strainTracePercent);
  const disorder = makeLandscape(random, [250, 700]);
  const brightness = makeLandscape(random, [200, 600]);
  const disorderMap = at((_, xNm, yNm) => DISORDER_EV * disorder(xNm, yNm));
  const brightMap = at((_, xNm, yNm) => 1 + 0.06 * brightness(xNm, yNm));
  const centreEv = trace.map(
    (percent, i) => INTERLAYER_EV + GAUGE_EV_PER_PERCENT_TRACE * percent + disorderMap[i],
  );

  const axis = makeFileAxis(829.5, 951.5, nk);
  const response = axis.wavelengthAirNm.map(siliconResponse);
  const share = brightestShare(axis, response, INTERLAYER_EV, INTERLAYER_FWHM_EV);
  const layerArea = options.peakCounts / share;
  const topPercent = trace.reduce((highest, percent) => Math.max(highest, percent), 0);
  return {
    name: 'twin-layer',
    shape: { ny, nx, nk },
    pitchNm: PITCH_NM,
    laserNm: LASER_AIR_NM,
    exposureS: 2,
    axis,
    peaks: [
      {
        name: 'interlayer',
        shape: 'gaussian',
        centreEv,
        // excitons slide toward lower energy before they emit: brighter where the layer is stretched, without a ring
        area: trace.map(
          (percent, i) => layerArea * brightMap[i] * (1 + (0.8 * percent) / topPercent),
        ),
        fwhmEv: new Float64Array(ny * nx).fill(INTERLAYER_FWHM_EV),
      },
    ],
    // the laser's scattered light, falling away from it
    floor: axis.centresEv.map((ev) => options.peakCounts * (0.01 + 0.05 * exp((ev - 1.5) / 0.04))),
    response,
    darkCounts: makeDarkCounts(nk),
    readNoiseCounts: READ_NOISE_COUNTS,
    hitsPerPixel: 0.08,
    heightNm: height,
    heightNoiseNm: 0.08,
    maps: [{ name: 'strain.trace', unit: 'percent', values: trace }],
    constants: {
      laser_eV: evFromNm(vacuumNmFromAir(LASER_AIR_NM)),
      interlayer_unstrained_eV: INTERLAYER_EV,
      interlayer_disorder_eV: DISORDER_EV,
      gauge_meV_per_percent_trace: 1000 * GAUGE_EV_PER_PERCENT_TRACE,
      poisson_ratio: POISSON_RATIO,
      read_noise_counts: READ_NOISE_COUNTS,
    },
    landmarks: findLandmarks(relief, trace, options),
  };
}

/** Silicon absorbs less and less toward its band edge; the curve falls steeply past 930 nm. */
function siliconResponse(nm: number): number {
  return 0.88 / (1 + exp((nm - 930) / 22));
}

/** Flat ground, the middle bubble's flank (half of the top's strain) and its top. */
function findLandmarks(relief: Relief, trace: Float64Array, shape: ScanShape): Landmark[] {
  const bell = relief.bells[0];
  const distance2 = (i: number) =>
    squaredDistance(bell, (i % shape.nx) * PITCH_NM, Math.floor(i / shape.nx) * PITCH_NM);
  const isNear = (i: number) => distance2(i) < 4 * bell.sigmaNm * bell.sigmaNm;
  const half = strainTracePercent(relief, bell.xNm, bell.yNm) / 2;
  return [
    bestPixel('flat', shape, (i) => -trace[i]),
    bestPixel('flank', shape, (i) => (isNear(i) ? -Math.abs(trace[i] - half) : -Infinity)),
    bestPixel('top', shape, (i) => -distance2(i)),
  ];
}
