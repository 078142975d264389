/** Heights and margins of the energy panel, px: hung maps above, ties between, plot below. */
export const panelLayout = {
  leftPx: 46,
  rightPx: 14,
  tileTopPx: 18,
  tilePx: 84,
  plotTopPx: 136,
  /** of the residuals of a fit, within the plot at its top */
  residualPx: 22,
  bottomPx: 34,
} as const;
