/** Keeps the spectra on screen in step with the pins of the recipe and with the crosshair. */
import type { Pixel } from '../../workers/engine';
import { createLatestWins } from '../../workers/latest-wins';
import type { Pin } from '../recipe/schema';
import type { CurrentScan } from './session-store';
import type { PixelSpectrum } from './spectra-store';
import type { Workbench } from './workbench';

export function followSpectra(workbench: Workbench): () => void {
  const { session, recipe, crosshair, spectra, notices } = workbench;
  const hover = createLatestWins();
  const pins = createLatestWins();

  const isCurrent = (scanNumber: number): boolean => session.getState().scanNumber === scanNumber;
  /** What a scan that is gone could not answer is no trouble. */
  const sayOf = (scanNumber: number) => (error: unknown) => {
    if (isCurrent(scanNumber)) notices.sayError(error);
  };

  const updateHover = (): void => {
    const { scan, scanNumber } = session.getState();
    const pixel = crosshair.get();
    if (scan === null || pixel === null) {
      hover.clear();
      spectra.setState({ hovered: null });
      return;
    }
    hover.run(async () => {
      const counts = await scan.open.spectrum(pixel);
      // The cursor may have left meanwhile.
      if (isCurrent(scanNumber) && crosshair.get() !== null)
        spectra.setState({ hovered: { pixel, counts } });
    }, sayOf(scanNumber));
  };

  const updatePins = (): void => {
    const { scan, scanNumber } = session.getState();
    if (scan === null) return;
    const wanted = recipe.getState().recipe.pins ?? [];
    pins.run(async () => {
      const read = await readPins(scan, wanted, spectra.getState().pins, isSameScan(scanNumber));
      if (isCurrent(scanNumber)) spectra.setState({ pins: read });
      lastScanNumber = scanNumber;
    }, sayOf(scanNumber));
  };

  let lastScanNumber = -1;
  const isSameScan = (scanNumber: number): boolean => scanNumber === lastScanNumber;

  const unsubscribers = [
    crosshair.subscribe(updateHover),
    recipe.subscribe((now, before) => {
      if (now.recipe.pins !== before.recipe.pins) updatePins();
    }),
    session.subscribe((now, before) => {
      if (now.scanNumber === before.scanNumber) return;
      spectra.setState({ pins: new Map(), hovered: null });
      if (isOnScan(now.scan, crosshair.get())) updateHover();
      else crosshair.set(null);
      updatePins();
    }),
  ];
  updatePins();
  return () => {
    for (const unsubscribe of unsubscribers) unsubscribe();
  };
}

function isOnScan(scan: CurrentScan | null, pixel: Pixel | null): boolean {
  if (scan === null || pixel === null) return false;
  const { ny, nx } = scan.open.plan.meta.shape;
  return pixel.y < ny && pixel.x < nx;
}

/** Spectra of the pins that lie on the scan; what is already known of the same scan is not read again. */
async function readPins(
  scan: CurrentScan,
  wanted: readonly Pin[],
  known: ReadonlyMap<string, PixelSpectrum>,
  isSameScan: boolean,
): Promise<ReadonlyMap<string, PixelSpectrum>> {
  const { ny, nx } = scan.open.plan.meta.shape;
  const read = new Map<string, PixelSpectrum>();
  for (const { name, x, y } of wanted) {
    if (x >= nx || y >= ny) continue;
    const before = known.get(name);
    const isKnown = isSameScan && before?.pixel.x === x && before.pixel.y === y;
    const counts = isKnown ? before.counts : await scan.open.spectrum({ y, x });
    read.set(name, isKnown ? before : { pixel: { y, x }, counts });
  }
  return read;
}
