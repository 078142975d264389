/** One open scan: questions go to the workers that hold the rows, answers are put together. */
import { RimlightError, throwIfAborted } from '../src/errors';
import type { ScanPlan } from '../src/io/scan-plan';
import { createFitModel } from '../src/science/fit/fit-model';
import { fitOne } from '../src/science/fit/pixel-fit';
import { joinedMaps, maskRows, meanOfRows } from './assemble';
import type { OpenScan, Pixel, RowRange, ScanOverview } from './engine';
import { fitScan, startOfPixel } from './scan-fit';
import type { Seat } from './seat';

/** A worker's place and the rows it holds. */
export interface SlabSeat {
  readonly seat: Seat;
  readonly rows: RowRange;
}

export function createOpenScan(
  scanId: number,
  plan: ScanPlan,
  overview: ScanOverview,
  slabs: readonly SlabSeat[],
  newCallId: () => number,
): OpenScan {
  const { shape } = plan.meta;
  const withErrors = overview.meta.noise.kind !== 'none';
  let isReleased = false;

  const assertHeld = (): void => {
    if (!isReleased) return;
    throw new RimlightError('fault', {
      what: `${plan.meta.name} was closed`,
      where: '',
      hint: 'Open the scan again.',
    });
  };

  return {
    plan,
    overview,

    async bandMaps(request, { signal, onProgress } = {}) {
      const what = `computing a band of ${plan.meta.name}`;
      assertHeld();
      throwIfAborted(signal, what);
      if (request.quantities.length === 0) return [];
      const parts = await Promise.all(
        slabs.map(({ seat }) =>
          seat.callOn(scanId, (engine) => engine.bandMaps(scanId, request, withErrors)),
        ),
      );
      throwIfAborted(signal, what);
      onProgress?.(1);
      return joinedMaps(parts);
    },

    async spectrum(pixel) {
      assertHeld();
      const { seat } = slabOf(pixel);
      return seat.callOn(scanId, (engine) => engine.spectrum(scanId, pixel));
    },

    async fit(asked, options = {}) {
      assertHeld();
      return fitScan({ scanId, overview, slabs, newCallId }, asked, options);
    },

    async fitPixel(asked, pixel, from) {
      assertHeld();
      const { seat } = slabOf(pixel);
      const counts = await seat.callOn(scanId, (engine) => engine.spectrum(scanId, pixel));
      const { axis } = overview.meta;
      const model = createFitModel(asked, axis);
      const start = from === undefined ? null : startOfPixel(from, axis, pixel);
      return fitOne(model, counts.subarray(asked.firstChannel, asked.endChannel), start);
    },

    async meanSpectrum(mask) {
      assertHeld();
      if (mask.length !== shape.ny * shape.nx) throw wrongMask(mask.length);
      const parts = await Promise.all(
        slabs.map(({ seat, rows }) =>
          // Cut anew for every attempt: the part is transferred.
          seat.callOn(scanId, (engine) =>
            engine.maskedRowSums(scanId, maskRows(mask, shape, rows)),
          ),
        ),
      );
      return meanOfRows(parts, shape.nk);
    },

    async release() {
      if (isReleased) return;
      isReleased = true;
      await Promise.all(slabs.map(({ seat }) => seat.release(scanId)));
    },
  };

  function slabOf({ y, x }: Pixel): SlabSeat {
    const slab = slabs.find(({ rows }) => y >= rows.y0 && y < rows.y1);
    const isWhole = Number.isInteger(y) && Number.isInteger(x);
    if (slab !== undefined && isWhole && x >= 0 && x < shape.nx) return slab;
    throw new RimlightError('fault', {
      what: `pixel (${x}, ${y}) is not on a scan of ${shape.nx} × ${shape.ny} pixels`,
      where: plan.meta.name,
      hint: 'Please report this.',
    });
  }

  function wrongMask(length: number): RimlightError {
    return new RimlightError('fault', {
      what: `a mask of ${length} pixels does not fit a scan of ${shape.nx} × ${shape.ny}`,
      where: plan.meta.name,
      hint: 'Please report this.',
    });
  }
}
