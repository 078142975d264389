/**
 * `tent-field`: a WS₂ monolayer draped over low silica nanopillars, seen at 594.1 nm with a 15 nm pitch.
 *
 * On each tent stretching pulls the exciton down from 2.010 eV; on the tent's rim, where the layer meets the ground,
 * localised states emit some 90 meV below it. A wrinkle crosses the field. The A1′ and 2LA(M) Raman lines ride on the
 * blue side of the luminescence. Numbers without a source are our choice for this invented sample.
 */
import { vacuumNmFromAir } from '../air';
import { exp, sin } from '../numeric/elementary';
import type { ScanShape } from '../scan';
import { evFromCm1, evFromNm } from '../units';
import { bestPixel } from './landmarks';
import {
  brightestShare,
  type Landmark,
  type PeakMaps,
  type ScenarioOptions,
  type ScenarioPlan,
} from './plan';
import { squaredDistance } from './relief';
import { makeDarkCounts, makeFileAxis } from './spectrograph';
import {
  describePixels,
  disorderEv,
  type Field,
  layOut,
  type Pixels,
  pitchNm,
  poissonRatio,
} from './tent-layout';

const LASER_AIR_NM = 594.1;
const LASER_EV = evFromNm(vacuumNmFromAir(LASER_AIR_NM));
/** 2.01 to 2.02 eV at room temperature (from memory) */
const EXCITON_EV = 2.01;
/** 30 meV falling to 24 meV under strain: Aslan, Deng and Heinz, Phys. Rev. B 98, 115308 (2018); here with 2 meV of instrument */
const EXCITON_FWHM_EV = 0.032;
const FWHM_CHANGE_EV_PER_PERCENT = -0.005;
/** −130 meV per percent biaxial (arXiv:2307.12663), that is per two percent of trace */
const GAUGE_EV_PER_PERCENT_TRACE = -0.065;
const LOCALISED_BELOW_EV = 0.09;
const LOCALISED_FWHM_EV = 0.052;
const READ_NOISE_COUNTS = 3.2;

/** Raman lines, cm⁻¹, and their Grüneisen parameters: shift = unstrained (1 − γ trace). Widths with the instrument's. */
const ramanLines = [
  { name: 'A1', shiftCm1: 418, grueneisen: 0.3, fwhmCm1: 7, share: 0.014 },
  { name: '2LA', shiftCm1: 350, grueneisen: 0.55, fwhmCm1: 9, share: 0.011 },
] as const;

export function planTentField(options: ScenarioOptions): ScenarioPlan {
  const { ny, nx, nk } = options;
  const field = layOut(options);
  const axis = makeFileAxis(600.4, 679.6, nk);
  const response = axis.wavelengthAirNm.map(detectorResponse);
  const pixels = describePixels(field, ny, nx);
  const shifts = ramanLines.map((line) => ({
    name: `${line.name}.shift`,
    unit: 'cm-1',
    values: pixels.trace.map((percent) => line.shiftCm1 * (1 - (line.grueneisen * percent) / 100)),
  }));
  const layerArea =
    options.peakCounts / brightestShare(axis, response, EXCITON_EV, EXCITON_FWHM_EV);
  return {
    name: 'tent-field',
    shape: { ny, nx, nk },
    pitchNm,
    laserNm: LASER_AIR_NM,
    exposureS: 0.5,
    axis,
    peaks: [
      ...luminescence(pixels, layerArea),
      ...ramanLines.map((line, i) => ramanPeak(line, shifts[i].values, pixels.rim, layerArea)),
    ],
    floor: new Float64Array(nk).fill(0.006 * options.peakCounts),
    response,
    darkCounts: makeDarkCounts(nk),
    readNoiseCounts: READ_NOISE_COUNTS,
    hitsPerPixel: 0.03,
    heightNm: pixels.height,
    heightNoiseNm: 0.08,
    maps: [{ name: 'strain.trace', unit: 'percent', values: pixels.trace }, ...shifts],
    constants,
    landmarks: findLandmarks(field, pixels, options),
  };
}

const constants = {
  laser_eV: LASER_EV,
  exciton_unstrained_eV: EXCITON_EV,
  exciton_disorder_eV: disorderEv,
  gauge_meV_per_percent_trace: 1000 * GAUGE_EV_PER_PERCENT_TRACE,
  localised_below_exciton_eV: LOCALISED_BELOW_EV,
  poisson_ratio: poissonRatio,
  A1_unstrained_cm1: ramanLines[0].shiftCm1,
  A1_grueneisen: ramanLines[0].grueneisen,
  '2LA_unstrained_cm1': ramanLines[1].shiftCm1,
  '2LA_grueneisen': ramanLines[1].grueneisen,
  read_noise_counts: READ_NOISE_COUNTS,
};

function luminescence(pixels: Pixels, layerArea: number): PeakMaps[] {
  const { trace } = pixels;
  const excitonEv = trace.map(
    (percent, i) => EXCITON_EV + GAUGE_EV_PER_PERCENT_TRACE * percent + pixels.disorderEv[i],
  );
  return [
    {
      name: 'exciton',
      shape: 'gaussian',
      centreEv: excitonEv,
      area: pixels.exciton.map((part) => part * layerArea),
      fwhmEv: trace.map((percent) => EXCITON_FWHM_EV + FWHM_CHANGE_EV_PER_PERCENT * percent),
    },
    {
      name: 'localised',
      shape: 'gaussian',
      centreEv: excitonEv.map((ev, i) => ev - LOCALISED_BELOW_EV + pixels.offsetEv[i]),
      area: pixels.localised.map((part) => part * layerArea),
      fwhmEv: new Float64Array(trace.length).fill(LOCALISED_FWHM_EV),
    },
  ];
}

function ramanPeak(
  line: (typeof ramanLines)[number],
  shiftCm1: Float64Array,
  rim: Float64Array,
  layerArea: number,
): PeakMaps {
  return {
    name: line.name,
    shape: 'lorentzian',
    centreEv: shiftCm1.map((cm1) => LASER_EV - evFromCm1(cm1)),
    area: rim.map((part) => line.share * layerArea * (1 + 0.6 * part)),
    fwhmEv: new Float64Array(rim.length).fill(evFromCm1(line.fwhmCm1)),
  };
}

/** A silicon detector behind a grating, with the faint fringes of a thinned chip. */
function detectorResponse(nm: number): number {
  const z = (nm - 655) / 105;
  return 0.86 * exp(-0.5 * z * z) * (1 + 0.015 * sin((2 * Math.PI * nm) / 11.3));
}

/** Flat ground, the middle tent's rim at its brightest clear of the wrinkle, and its crown. */
function findLandmarks(field: Field, pixels: Pixels, shape: ScanShape): Landmark[] {
  const { bell } = field.tents[0];
  const distance2 = (i: number) =>
    squaredDistance(bell, (i % shape.nx) * pitchNm, Math.floor(i / shape.nx) * pitchNm);
  const isNear = (i: number) => distance2(i) < 4 * bell.sigmaNm * bell.sigmaNm;
  return [
    bestPixel('flat', shape, (i) => -pixels.trace[i] - pixels.localised[i]),
    bestPixel('rim', shape, (i) => (isNear(i) ? pixels.rim[i] - 2 * pixels.ridge[i] : -Infinity)),
    bestPixel('crown', shape, (i) => -distance2(i)),
  ];
}
