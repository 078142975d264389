/** The spectrograph and detector of the scenarios: wavelengths of the channels, dark counts, noise, cosmic rays. */
import { vacuumNmFromAir } from '../air';
import { channelEdges } from '../axis';
import { sin } from '../numeric/elementary';
import type { Random } from '../numeric/random';
import { evFromNm } from '../units';
import type { FileAxis } from './plan';

/** Dispersion changes by this share from one end of the detector to the other, as the cosine of the diffraction angle does. */
const DISPERSION_CHANGE = 0.024;
const SATURATION = 65535;

/**
 * Channels from one wavelength to another, ascending, slightly closer together toward the long end.
 *
 * @param fromNm - first channel, nm in air
 * @param toNm - last channel, nm in air
 */
export function makeFileAxis(fromNm: number, toNm: number, nk: number): FileAxis {
  const wavelengthAirNm = Float64Array.from({ length: nk }, (_, k) => {
    const t = k / (nk - 1);
    return fromNm + (toNm - fromNm) * (t + (DISPERSION_CHANGE / 2) * t * (1 - t));
  });
  const centresEv = wavelengthAirNm.map((nm) => evFromNm(vacuumNmFromAir(nm)));
  const edgesEv = channelEdges(centresEv.toReversed()).toReversed();
  return { wavelengthAirNm, centresEv, edgesEv };
}

/** Counts of a closed shutter, (nk): an offset of about 300 with the slow unevenness of a read-out register. */
export function makeDarkCounts(nk: number): Float64Array {
  return Float64Array.from({ length: nk }, (_, k) => 300 + 1.5 * sin((9 * k) / nk) + (2 * k) / nk);
}

/**
 * One reading of one channel: Poisson arrivals, Gaussian read noise, dark counts, rounded and cut to 16 bits.
 *
 * @param expected - counts expected from light, response applied
 */
export function readChannel(
  random: Random,
  expected: number,
  darkCounts: number,
  readNoiseCounts: number,
): number {
  return toSixteenBits(random.poisson(expected) + readNoiseCounts * random.normal() + darkCounts);
}

/** Whole counts as a 16-bit converter gives them. */
export function toSixteenBits(counts: number): number {
  return Math.min(Math.max(Math.round(counts), 0), SATURATION);
}

/** One channel of one cosmic-ray hit. */
export interface Spike {
  readonly y: number;
  readonly x: number;
  /** channel as in the file */
  readonly k: number;
  /** counts added to what light gave, before saturation */
  readonly counts: number;
}

/**
 * Cosmic-ray hits of one pixel: each lights one to three neighbouring channels with 500 to 16 000 counts, small hits
 * more often than large ones.
 */
export function drawSpikes(
  random: Random,
  hitsPerPixel: number,
  { y, x, nk }: { readonly y: number; readonly x: number; readonly nk: number },
): Spike[] {
  const spikes: Spike[] = [];
  for (let hit = random.poisson(hitsPerPixel); hit > 0; hit--) {
    const first = Math.floor(random.uniform() * nk);
    const length = random.uniform() < 0.7 ? 1 : random.uniform() < 0.7 ? 2 : 3;
    // 1/u spreads sizes over a factor of 32, with the number falling as the square of the size
    let counts = 500 / (1 / 32 + (31 / 32) * random.uniform());
    for (let k = first; k < Math.min(first + length, nk); k++) {
      spikes.push({ y, x, k, counts: Math.round(counts) });
      counts *= 0.3 + 0.5 * random.uniform();
    }
  }
  return spikes;
}
