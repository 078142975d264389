/** Conditioned slabs made of given counts. */
import { channelEdges } from '../../../src/science/axis';
import {
  type ConditionedSlab,
  conditionedFrom,
  type Grid,
  type Precision,
} from '../../../src/science/condition/conditioned';
import type { EnergyAxis, NoiseModel, PositionAxis, ScanShape } from '../../../src/science/scan';

export const poisson: NoiseModel = { kind: 'poisson' };
export const noNoise: NoiseModel = { kind: 'none' };
export const place = 'condition[0], step';

export function axisOf(centresEv: ArrayLike<number>): EnergyAxis {
  const centres = Float64Array.from(centresEv);
  return { centresEv: centres, edgesEv: channelEdges(centres) };
}

/** nk channels, 1 meV apart from 1.8 eV up. */
export function evenAxis(nk: number): EnergyAxis {
  return axisOf(Float64Array.from({ length: nk }, (_, k) => 1.8 + 0.001 * k));
}

const pixels: PositionAxis = { label: 'x', unit: 'nm', isLength: true, pitch: 10, values: null };

export function gridOf(shape: ScanShape, noise: NoiseModel = poisson): Grid {
  return { shape, axis: evenAxis(shape.nk), noise, laserEv: 2.33, x: pixels, y: pixels };
}

export function slabOf(
  counts: ArrayLike<number>,
  shape: ScanShape,
  noise: NoiseModel = poisson,
  precision: Precision = 'float64',
): ConditionedSlab {
  const slab = { y0: 0, shape, counts: Float64Array.from(counts) };
  return conditionedFrom(slab, { axis: evenAxis(shape.nk), noise }, precision);
}

/** One spectrum as a scan of one pixel. */
export function spectrumOf(
  counts: ArrayLike<number>,
  noise: NoiseModel = poisson,
): ConditionedSlab {
  return slabOf(counts, { ny: 1, nx: 1, nk: counts.length }, noise);
}
