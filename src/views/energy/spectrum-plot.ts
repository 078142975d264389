/**
 * The plotted spectra: axes, grid and lines of the pins and the mean, drawn by the plotting library.
 * Create, update, destroy; it has no interaction of its own, the overlay above it has.
 */
import { scaleLinear } from 'd3-scale';
import { formatCount } from '../../science/format';
import type { PlotLibrary, PlotTrace } from './plotting-library';

export interface SpectrumLine {
  readonly name: string;
  /** (nk), eV */
  readonly energiesEv: Float64Array;
  /** (nk) counts per channel; NaN breaks the line */
  readonly counts: Float64Array;
  readonly colour: string;
  readonly widthPx: number;
}

export interface SpectrumFrame {
  readonly widthPx: number;
  readonly heightPx: number;
  readonly marginPx: {
    readonly l: number;
    readonly r: number;
    readonly t: number;
    readonly b: number;
  };
  readonly energyRange: readonly [number, number];
  readonly countsRange: readonly [number, number];
  readonly isLog: boolean;
  readonly ink: string;
  readonly grid: string;
  readonly font: string;
}

export interface SpectrumPlot {
  update(lines: readonly SpectrumLine[], frame: SpectrumFrame): void;
  destroy(): void;
}

export function createSpectrumPlot(host: HTMLElement, library: PlotLibrary): SpectrumPlot {
  let isAlive = true;
  return {
    update(lines, frame) {
      if (isAlive)
        void library.react(host, lines.map(asTrace), layoutOf(frame), {
          staticPlot: true,
          responsive: false,
        });
    },
    destroy() {
      isAlive = false;
      library.purge(host);
    },
  };
}

function asTrace({ name, energiesEv, counts, colour, widthPx }: SpectrumLine): PlotTrace {
  return {
    x: energiesEv,
    y: counts,
    type: 'scatter',
    mode: 'lines',
    name,
    line: { color: colour, width: widthPx },
    connectgaps: false,
    hoverinfo: 'skip',
  };
}

function layoutOf(frame: SpectrumFrame): Record<string, unknown> {
  const axis = {
    color: frame.ink,
    gridcolor: frame.grid,
    zeroline: false,
    showline: false,
    ticks: '',
    tickfont: { family: frame.font, size: 10.5, color: frame.ink },
    fixedrange: true,
    automargin: false,
  };
  const [low, high] = frame.countsRange;
  return {
    width: frame.widthPx,
    height: frame.heightPx,
    margin: { ...frame.marginPx, pad: 0 },
    paper_bgcolor: 'rgba(0,0,0,0)',
    plot_bgcolor: 'rgba(0,0,0,0)',
    showlegend: false,
    dragmode: false,
    hovermode: false,
    xaxis: {
      ...axis,
      range: [...frame.energyRange],
      ...energyTicks(frame),
    },
    yaxis: {
      ...axis,
      type: frame.isLog ? 'log' : 'linear',
      range: frame.isLog ? [Math.log10(low), Math.log10(high)] : [low, high],
      ...countsTicks(frame),
    },
  };
}

function countsTicks({ countsRange, isLog }: SpectrumFrame): Record<string, unknown> {
  const ticks = isLog ? decades(countsRange) : scaleLinear(countsRange, [0, 1]).ticks(4);
  return { tickmode: 'array', tickvals: ticks, ticktext: ticks.map(formatCount) };
}

/** Powers of ten within a range. */
function decades([low, high]: readonly [number, number]): readonly number[] {
  const powers: number[] = [];
  for (let power = Math.ceil(Math.log10(low)); 10 ** power <= high; power++)
    powers.push(10 ** power);
  return powers;
}

/** Round energies with as many decimals as their step needs, the same for all. */
function energyTicks({ energyRange, widthPx }: SpectrumFrame): Record<string, unknown> {
  const scale = scaleLinear(energyRange, [0, 1]);
  const count = Math.max(3, Math.round(widthPx / 110));
  const values = scale.ticks(count);
  return { tickmode: 'array', tickvals: values, ticktext: values.map(scale.tickFormat(count)) };
}
