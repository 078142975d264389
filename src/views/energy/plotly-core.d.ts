/** The library's core has no types of its own for this entry; these are the two calls we make. */
declare module 'plotly.js/lib/core' {
  const library: import('./plotting-library').PlotLibrary;
  export = library;
}
