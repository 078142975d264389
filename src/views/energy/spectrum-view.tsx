/** The spectra themselves: pins and mean by the plotting library, the hovered pixel on a canvas above it. */
import { type ScaleLinear, scaleLinear, scaleLog } from 'd3-scale';
import { useEffect, useMemo, useRef, useState } from 'react';
import { componentColours } from '../../state/component-colours';
import type { Pixel } from '../../state/crosshair';
import type { PixelSpectrum } from '../../state/spectra-store';
import { pinColour } from '../map/pin-styles';
import { readTokens } from '../read-tokens';
import { useRecipe, useSession, useSpectra, useView, useWorkbench } from '../workbench-context';
import { countsLimits } from './counts-scale';
import { drawFit } from './draw-fit';
import styles from './energy-panel.module.css';
import { clearCanvas, drawLine, fitCanvas } from './line-canvas';
import { panelLayout } from './panel-layout';
import { loadPlotLibrary } from './plotting-library';
import { createSpectrumPlot, type SpectrumLine, type SpectrumPlot } from './spectrum-plot';

interface Props {
  readonly evToX: ScaleLinear<number, number>;
  readonly widthPx: number;
  readonly heightPx: number;
}

export function SpectrumView({ evToX, widthPx, heightPx }: Props): React.JSX.Element {
  const { spectra, fit } = useWorkbench();
  const recipe = useRecipe((document) => document);
  const componentShades = useMemo(() => componentColours(recipe), [recipe]);
  const hasModel = recipe.model !== undefined;
  const theme = useView((view) => view.theme);
  const isLog = useView((view) => view.logCounts);
  const scan = useSession((session) => session.scan);
  const pins = useSpectra((state) => state.pins);
  const plotHost = useRef<HTMLDivElement>(null);
  const hoverCanvas = useRef<HTMLCanvasElement>(null);
  const [plot, setPlot] = useState<SpectrumPlot | null>(null);

  const overview = scan?.open.overview ?? null;
  const axis = overview?.meta.axis ?? null;
  const [fromEv = 0, toEv = 1] = evToX.domain();
  const channels = useMemo(
    () => (axis === null ? { from: 0, to: 0 } : channelsWithin(axis.centresEv, fromEv, toEv)),
    [axis, fromEv, toEv],
  );
  const hoveredTop = useSpectra((state) => roundTop(state.hovered?.counts, channels));

  const lines = useMemo((): readonly SpectrumLine[] => {
    if (overview === null) return [];
    const energiesEv = overview.meta.axis.centresEv;
    const tokens = readTokens(theme);
    const mean = {
      name: 'mean of the scan',
      energiesEv,
      counts: overview.meanSpectrum,
      colour: tokens.ink3,
      widthPx: 1,
    };
    const pinned = [...pins].map(([name, { counts }]) => ({
      name: `pin ${name}`,
      energiesEv,
      counts,
      colour: pinColour(name, theme),
      widthPx: 1.2,
    }));
    return [mean, ...pinned];
  }, [overview, pins, theme]);

  const limits = useMemo(() => {
    const { low, high } = countsLimits(
      lines.map((line) => line.counts),
      channels,
      isLog,
    );
    return { low, high: Math.max(high, hoveredTop) };
  }, [lines, channels, isLog, hoveredTop]);

  useEffect(() => {
    const host = plotHost.current;
    if (host === null) return;
    let made: SpectrumPlot | null = null;
    let isGone = false;
    void loadPlotLibrary().then((library) => {
      if (isGone) return;
      made = createSpectrumPlot(host, library);
      setPlot(made);
    });
    return () => {
      isGone = true;
      made?.destroy();
    };
  }, []);

  useEffect(() => {
    const tokens = readTokens(theme);
    plot?.update(lines, {
      widthPx,
      heightPx,
      marginPx: {
        l: panelLayout.leftPx,
        r: panelLayout.rightPx,
        t: panelLayout.plotTopPx,
        b: panelLayout.bottomPx,
      },
      energyRange: [fromEv, toEv],
      countsRange: [limits.low, limits.high],
      isLog,
      ink: tokens.ink2,
      grid: tokens.grid,
      font: tokens.mono,
    });
  }, [plot, lines, limits, fromEv, toEv, widthPx, heightPx, isLog, theme]);

  useEffect(() => {
    const canvas = hoverCanvas.current;
    if (canvas === null || axis === null) return;
    const range: [number, number] = [heightPx - panelLayout.bottomPx, panelLayout.plotTopPx];
    const countsToY = (isLog ? scaleLog : scaleLinear)([limits.low, limits.high], range).clamp(
      true,
    );
    const xsPx = axis.centresEv.map((energy) => evToX(energy));
    const colour = readTokens(theme).ink;
    const yOf = (counts: number): number => (isLog && counts <= 0 ? range[0] : countsToY(counts));
    const { accent, ink2 } = readTokens(theme);
    const draw = (): void => {
      fitCanvas(canvas, widthPx, heightPx);
      clearCanvas(canvas);
      const { hovered } = spectra.getState();
      if (hovered !== null) drawLine(canvas, xsPx, yOf, hovered.counts, { colour, widthPx: 1.2 });
      const { fitted } = fit.getState();
      if (fitted === null) return;
      const counts = spectrumAt(fitted.pixel, hovered, spectra.getState().pins);
      if (counts === null) return;
      const { firstChannel } = fitted.fit.plan;
      const strip = { top: panelLayout.plotTopPx + 4, height: panelLayout.residualPx };
      const shown = { fit: fitted.fit, counts, firstChannel, colours: componentShades };
      drawFit(canvas, { ...shown, evToX, yOf, strip, ink: ink2, accent });
    };
    draw();
    const forgetSpectra = spectra.subscribe(draw);
    const forgetFit = fit.subscribe(draw);
    return () => {
      forgetSpectra();
      forgetFit();
    };
  }, [axis, evToX, limits, widthPx, heightPx, isLog, theme, spectra, fit, componentShades]);

  const plotBox = {
    left: panelLayout.leftPx,
    right: panelLayout.rightPx,
    top: panelLayout.plotTopPx,
    bottom: panelLayout.bottomPx,
  };
  return (
    <>
      <div className={styles.ground} style={plotBox} />
      <div className={styles.plot} ref={plotHost} data-testid="spectrum-plot" />
      <canvas
        className={styles.hover}
        ref={hoverCanvas}
        style={{ width: widthPx, height: heightPx, clipPath: clipOf(plotBox) }}
      />
      <span
        className={styles.unit}
        style={{ top: panelLayout.plotTopPx + 6 + (hasModel ? panelLayout.residualPx : 0) }}
      >
        {overview?.meta.quantity ?? 'counts'} / channel
      </span>
      <span className={styles.caption}>photon energy (eV)</span>
    </>
  );
}

function clipOf(box: { left: number; right: number; top: number; bottom: number }): string {
  return `inset(${box.top}px ${box.right}px ${box.bottom}px ${box.left}px)`;
}

/** Counts of a pixel among the spectra on screen. */
function spectrumAt(
  { y, x }: Pixel,
  hovered: PixelSpectrum | null,
  pins: ReadonlyMap<string, PixelSpectrum>,
): Float64Array | null {
  const shown = hovered === null ? [...pins.values()] : [hovered, ...pins.values()];
  return shown.find(({ pixel }) => pixel.y === y && pixel.x === x)?.counts ?? null;
}

/** A round limit above the hovered counts in view, so that the axis is drawn anew only when it must grow. */
function roundTop(counts: Float64Array | undefined, channels: ChannelRange): number {
  if (counts === undefined) return 0;
  return countsLimits([counts], channels, false).high;
}

interface ChannelRange {
  readonly from: number;
  readonly to: number;
}

function channelsWithin(centresEv: Float64Array, fromEv: number, toEv: number): ChannelRange {
  let from = 0;
  while (from < centresEv.length && (centresEv[from] ?? 0) < fromEv) from++;
  let to = from;
  while (to < centresEv.length && (centresEv[to] ?? 0) <= toEv) to++;
  return { from, to };
}
