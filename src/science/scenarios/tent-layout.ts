/** The ground plan of `tent-field`: where tents and wrinkle are, and what that makes of each pixel. */
import { cos, exp, sin } from '../numeric/elementary';
import { createRandom } from '../numeric/random';
import { layoutStream, type ScenarioOptions } from './plan';
import {
  type Bell,
  placeBells,
  type Relief,
  type Ridge,
  reliefHeightNm,
  ridgeProfile,
  squaredDistance,
  strainTracePercent,
} from './relief';
import { type Landscape, makeLandscape } from './unevenness';

export const pitchNm = 15;
export const poissonRatio = 0.22;
/** Uneven ground under the layer moves the exciton without any strain; standard deviation, eV. */
export const disorderEv = 0.0015;
/** Where the rim lies, in units of the bell's s. */
const RIM_RADIUS = 1.35;
const RIM_SIGMA_NM = 15;

/** A tent: its bell, the energy offset of its rim states and where around the rim they are brightest. */
export interface Tent {
  readonly bell: Bell;
  readonly offsetEv: number;
  readonly brightX: number;
  readonly brightY: number;
}

export interface Field {
  readonly relief: Relief;
  readonly tents: readonly Tent[];
  readonly wrinkle: Ridge;
  readonly disorder: Landscape;
  readonly brightness: Landscape;
}

export function layOut({ seed, ny, nx }: ScenarioOptions): Field {
  const random = createRandom(seed, layoutStream);
  const bells = placeBells(random, {
    widthNm: nx * pitchNm,
    depthNm: ny * pitchNm,
    spacingNm: 330,
    jitterNm: 30,
    sigmaNm: [46, 80],
    steepness: [0.18, 0.24],
    occupied: 0.88,
  });
  const tents = bells.map((bell): Tent => {
    const angle = 2 * Math.PI * random.uniform();
    const offsetEv = 0.01 * (random.uniform() - 0.5);
    return { bell, offsetEv, brightX: cos(angle), brightY: sin(angle) };
  });
  // past the middle tent's rim, where it makes one bright spot
  const middle = bells[0];
  const angleRad = 0.25 + 0.3 * random.uniform();
  const away = RIM_RADIUS * middle.sigmaNm;
  const wrinkle: Ridge = {
    xNm: middle.xNm - away * sin(angleRad),
    yNm: middle.yNm + away * cos(angleRad),
    angleRad,
    heightNm: 5.2,
    sigmaNm: 27,
  };
  return {
    relief: { bells, ridges: [wrinkle], poissonRatio },
    tents,
    wrinkle,
    disorder: makeLandscape(random, [180, 500]),
    brightness: makeLandscape(random, [120, 400]),
  };
}

export interface Pixels {
  readonly height: Float64Array;
  /** εxx + εyy, percent */
  readonly trace: Float64Array;
  /** the wrinkle's profile, 1 on its line */
  readonly ridge: Float64Array;
  /** 0 to about 1.4: how much of a rim there is */
  readonly rim: Float64Array;
  /** areas in units of the undisturbed layer's exciton */
  readonly exciton: Float64Array;
  readonly localised: Float64Array;
  /** of the rims' states */
  readonly offsetEv: Float64Array;
  /** of the exciton, without strain */
  readonly disorderEv: Float64Array;
}

export function describePixels(field: Field, ny: number, nx: number): Pixels {
  const map = () => new Float64Array(ny * nx);
  const pixels = {
    height: map(),
    trace: map(),
    ridge: map(),
    rim: map(),
    exciton: map(),
    localised: map(),
    offsetEv: map(),
    disorderEv: map(),
  };
  for (let i = 0; i < ny * nx; i++) {
    const xNm = (i % nx) * pitchNm;
    const yNm = Math.floor(i / nx) * pitchNm;
    const ridge = ridgeProfile(field.wrinkle, xNm, yNm);
    const { rim, offsetEv } = rimAt(field.tents, xNm, yNm);
    const height = reliefHeightNm(field.relief, xNm, yNm);
    pixels.height[i] = height;
    pixels.trace[i] = strainTracePercent(field.relief, xNm, yNm);
    pixels.ridge[i] = ridge;
    pixels.rim[i] = rim;
    // excitons drift to the rim and the wrinkle before they emit, and shine a little brighter off the ground
    const bright = 1 + 0.05 * field.brightness(xNm, yNm);
    pixels.exciton[i] =
      bright * (1 + 0.012 * height) * (1 - 0.4 * Math.min(rim, 1)) * (1 - 0.3 * ridge);
    pixels.localised[i] = 0.015 + 1.5 * rim + 0.8 * ridge * (1 + rim);
    pixels.offsetEv[i] = offsetEv;
    pixels.disorderEv[i] = disorderEv * field.disorder(xNm, yNm);
  }
  return pixels;
}

/** The rims' strength at a point, and the mean energy offset of their states. */
function rimAt(tents: readonly Tent[], xNm: number, yNm: number) {
  let rim = 0;
  let weighted = 0;
  for (const { bell, offsetEv, brightX, brightY } of tents) {
    const r = Math.sqrt(squaredDistance(bell, xNm, yNm));
    const z = (r - RIM_RADIUS * bell.sigmaNm) / RIM_SIGMA_NM;
    const turn = r > 0 ? ((xNm - bell.xNm) * brightX + (yNm - bell.yNm) * brightY) / r : 0;
    const part = exp(-0.5 * z * z) * (1 + 0.3 * turn);
    rim += part;
    weighted += part * offsetEv;
  }
  return { rim, offsetEv: rim > 1e-12 ? weighted / rim : 0 };
}
