/** The example of the public contract: every block, comments taken out and one word chosen where it lists several. */
export const contractRecipe = {
  recipe: 1,
  title: 'Tent field, first pass',
  scan: {
    data: '/entry/counts',
    order: 'yxk',
    axis: { data: '/entry/wavelength', kind: 'wavelength', unit: 'nm', medium: 'air' },
    pixel: { x: 15, y: 15, unit: 'nm' },
    laser: { value: 594.1, unit: 'nm' },
    serpentine: false,
    exposure_s: 0.5,
    detector: { electrons_per_count: 1, offset_counts: 0, read_noise_e: 0, excess_noise: 1 },
    height: { file: 'height.npy', unit: 'nm', shift_px: [0, 0] },
  },
  condition: [
    { step: 'despike', method: 'spectral', threshold: 6 },
    { step: 'offset', counts: 300 },
    { step: 'response', file: 'qe.csv' },
    {
      step: 'calibrate',
      points: [
        [585.2, 585.25],
        [640.1, 640.22],
      ],
      degree: 1,
      unit: 'nm',
    },
    { step: 'farfield', file: 'tip-out.npy', scale: 1, window: [1.9, 2.0] },
    { step: 'baseline', method: 'arpls' },
    { step: 'denoise', method: 'svd', rank: 8 },
    { step: 'align-rows', max_shift_px: 3 },
    { step: 'crop', axis: [1.8, 2.07], unit: 'eV', x: [0, 95], y: [0, 95] },
    { step: 'bin', x: 1, y: 1, k: 2 },
  ],
  bands: [
    { name: 'tail', from: 1.865, to: 1.925, unit: 'eV', floor: 'none' },
    { name: 'A1', from: 405, to: 430, unit: 'cm-1', floor: 'ends' },
  ],
  model: {
    window: [1.82, 2.06],
    noise: 'poisson',
    seed: 'neighbour',
    components: [
      { name: 'floor', shape: 'line' },
      {
        name: 'exciton',
        role: 'exciton',
        shape: 'gaussian',
        centre: { start: 2.01, min: 1.97, max: 2.04 },
        fwhm: { start: 0.045, min: 0.02, max: 0.09 },
      },
      {
        name: 'tail',
        role: 'localised',
        shape: 'tailed',
        centre: 1.92,
        fwhm: 0.05,
        tail: 0.03,
        optional: true,
      },
      {
        name: 'A1',
        role: 'raman',
        shape: 'lorentzian',
        centre: { start: 418, unit: 'cm-1' },
        fwhm: { start: 6, unit: 'cm-1' },
      },
    ],
  },
  blend: {
    mode: 'additive',
    channels: [
      { source: 'band.tail.integral', colour: '#ff5a4d', low: 'p1', high: 'p99.5', gamma: 1 },
    ],
  },
  regions: [{ name: 'flat', shape: 'rectangle', x: [0, 20], y: [70, 95] }],
  strain: {
    pl: {
      source: 'fit.exciton.centre',
      unstrained: { eV: 2.012 },
      gauge_meV_per_percent: -95,
      gauge_err: 10,
    },
    raman: {
      source: 'fit.A1.centre',
      unstrained: { region: 'flat' },
      grueneisen: 0.6,
      grueneisen_err: 0.1,
      state: 'biaxial',
      poisson: 0.22,
    },
    height: { poisson: 0.22, edges: 'held', smooth_nm: 0 },
  },
  features: { source: 'scan.height', threshold: 'otsu', min_area_px: 12, split: true },
};

/** A copy to spoil. */
export function contractCopy(): Spoilable {
  return structuredClone(contractRecipe);
}

export type Spoilable = typeof contractRecipe;
