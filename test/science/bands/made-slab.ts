/** Slabs made of given counts, ready for bands. */

import type { ElementType } from '../../../src/io/container';
import { channelEdges } from '../../../src/science/axis';
import { createPlainKernel, type MomentKernel } from '../../../src/science/bands/moment-kernel';
import { SlabBands } from '../../../src/science/bands/slab-bands';
import { prepareSlab, type SlabContext, type SlabData } from '../../../src/science/bands/slab-data';
import { tilePixelsFor } from '../../../src/science/bands/tiled-counts';
import type { CountsArray, EnergyAxis, NoiseModel, ScanShape } from '../../../src/science/scan';
import { elementContexts } from '../../../workers/element-context';

export const poisson: NoiseModel = { kind: 'poisson' };

export function axisOf(centresEv: Float64Array): EnergyAxis {
  return { centresEv, edgesEv: channelEdges(centresEv) };
}

/** Channels of a grating: evenly spaced in wavelength, so unevenly in energy; hc from SI 2019. */
export function gratingAxis(nk: number, fromNm = 580, toNm = 700): EnergyAxis {
  return axisOf(
    Float64Array.from({ length: nk }, (_, k) => {
      return 1239.8419843320025 / (toNm + ((fromNm - toNm) * k) / (nk - 1));
    }),
  );
}

/** The energy a share of the way along the axis. */
export function energyAt({ edgesEv }: EnergyAxis, share: number): number {
  return edgesEv[0] + share * (edgesEv[edgesEv.length - 1] - edgesEv[0]);
}

export interface SlabParts {
  readonly counts: CountsArray;
  readonly shape: ScanShape;
  readonly axis: EnergyAxis;
  readonly noise: NoiseModel;
  readonly type: ElementType;
  readonly kernel?: MomentKernel;
}

export function prepared(parts: SlabParts): SlabData {
  const { counts, shape, axis, noise, type } = parts;
  const context: SlabContext = { axis, noise, ...elementContexts[type] };
  const kernel = parts.kernel ?? createPlainKernel(tilePixelsFor(shape.nk));
  const steps = prepareSlab({ y0: 0, shape, counts: counts.slice() }, context, kernel);
  let step = steps.next();
  while (!step.done) step = steps.next();
  return step.value;
}

export function slabBands(parts: SlabParts): SlabBands {
  const kernel = parts.kernel ?? createPlainKernel(tilePixelsFor(parts.shape.nk));
  return new SlabBands(prepared({ ...parts, kernel }), kernel);
}

/** Some rows of a slab, as a slab of its own. */
export function rowsOf(parts: SlabParts, y0: number, y1: number): SlabParts {
  const { nx, nk } = parts.shape;
  return {
    ...parts,
    shape: { ny: y1 - y0, nx, nk },
    counts: parts.counts.slice(y0 * nx * nk, y1 * nx * nk),
  };
}
