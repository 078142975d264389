/** The only place that knows the plotting library: its core with line traces, fetched after first paint. */

export interface PlotTrace {
  readonly x: Float64Array;
  readonly y: Float64Array;
  readonly type: 'scatter';
  readonly mode: 'lines';
  readonly name: string;
  readonly line: { readonly color: string; readonly width: number; readonly dash?: string };
  readonly connectgaps: false;
  readonly hoverinfo: 'skip';
}

export interface PlotLibrary {
  react(
    host: HTMLElement,
    traces: readonly PlotTrace[],
    layout: Readonly<Record<string, unknown>>,
    config: Readonly<Record<string, unknown>>,
  ): Promise<unknown>;
  purge(host: HTMLElement): void;
}

let loading: Promise<PlotLibrary> | null = null;

export function loadPlotLibrary(): Promise<PlotLibrary> {
  loading ??= import('plotly.js/lib/core').then((module) => module.default);
  return loading;
}
