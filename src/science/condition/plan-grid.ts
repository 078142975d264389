/** Crop and bin in a chain: what changes the grid. */
import { assertBin, binnedGrid, binRemainder, binSlab } from './bin';
import type { StepOf } from './chain-step';
import { type Grid, rowsOf } from './conditioned';
import { type Crop, croppedGrid, cropSlab, planCrop } from './crop';
import { counted, onlySlab, planOf } from './plan-base';
import type { StepPlace } from './step-errors';
import { type PlannedStep, sharedRows } from './step-plan';

export interface PlannedCrop {
  readonly planned: PlannedStep;
  readonly crop: Crop;
}

/** @throws RimlightError 'recipe' - see `planCrop` */
export function planCropStep(step: StepOf<'crop'>, grid: Grid, place: StepPlace): PlannedCrop {
  const crop = planCrop(step, grid, place);
  const { first, end } = crop.y;
  const after = croppedGrid(grid, crop);
  const { ny, nx, nk } = after.shape;
  const planned = planOf(place, grid, {
    after,
    isOfDetector: true,
    rowsFor: ({ y0, y1 }) => ({ y0: y0 + first, y1: y1 + first }),
    rowsAfter: (rows) => {
      const { y0, y1 } = sharedRows(rows, { y0: first, y1: end });
      return y1 > y0 ? { y0: y0 - first, y1: y1 - first } : { y0: 0, y1: 0 };
    },
    apply: (slab, { y0, y1 }) => {
      return onlySlab(cropSlab(rowsOf(slab, y0 + first, y1 + first), crop));
    },
    report: () => ({
      place,
      line: `${nx} × ${ny} px of ${grid.shape.nx} × ${grid.shape.ny}, ${nk} of ${grid.shape.nk} channels`,
      warnings: [],
    }),
  });
  return { planned, crop };
}

/** @throws RimlightError 'recipe' - see `assertBin` */
export function planBinStep(step: StepOf<'bin'>, grid: Grid, place: StepPlace): PlannedStep {
  assertBin(step, grid, place);
  const after = binnedGrid(grid, step);
  const { ny, nx, nk } = after.shape;
  const rest = binRemainder(grid, step);
  const dropped = [
    rest.x > 0 ? counted(rest.x, 'column') : '',
    rest.y > 0 ? counted(rest.y, 'row') : '',
    rest.k > 0 ? counted(rest.k, 'channel') : '',
  ].filter((part) => part !== '');
  return planOf(place, grid, {
    reach: step.y === 1 ? { kind: 'pixel' } : { kind: 'rows', halo: step.y - 1 },
    after,
    isOfDetector: true,
    rowsFor: ({ y0, y1 }) => ({ y0: y0 * step.y, y1: y1 * step.y }),
    // A bin belongs to the owner of its first row.
    rowsAfter: ({ y0, y1 }) => {
      const from = Math.min(Math.ceil(y0 / step.y), ny);
      return { y0: from, y1: Math.max(from, Math.min(Math.ceil(y1 / step.y), ny)) };
    },
    apply: (slab, { y0, y1 }) => {
      return onlySlab(binSlab(rowsOf(slab, y0 * step.y, y1 * step.y), step));
    },
    report: () => ({
      place,
      line:
        `${step.x} × ${step.y} px and ${counted(step.k, 'channel')} into one: ${nx} × ${ny} px, ${nk} channels` +
        (dropped.length === 0 ? '' : `; ${dropped.join(', ')} dropped at the far edge`),
      warnings: [],
    }),
  });
}
