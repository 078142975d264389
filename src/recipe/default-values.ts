/** The default of every recipe field that has one, stated once: the schema's texts and the program read them here. */

export const defaults = {
  scan: {
    medium: 'air',
    serpentine: false,
    detector: { electrons_per_count: 1, offset_counts: 0, read_noise_e: 0, excess_noise: 1 },
    height: { unit: 'nm', shift_px: [0, 0] },
  },
  despike: { method: 'spectral', threshold: 6 },
  calibrate: { degree: 1 },
  farfield: { scale: 1 },
  baseline: { smoothness: 1e5, asymmetry: 0.01, iterations: 20, half_width: 40, degree: 2 },
  denoise: { rank: 'auto' },
  alignRows: { max_shift_px: 3 },
  crop: { unit: 'eV' },
  bin: { x: 1, y: 1, k: 1 },
  band: { floor: 'none' },
  model: { seed: 'neighbour' },
  parameter: { unit: 'eV' },
  tie: { plus: 0, times: 1 },
  channel: { low: 'p1', high: 'p99.5', gamma: 1 },
  region: { angle: 0 },
  strain: { gauge_err: 0, grueneisen_err: 0, state: 'biaxial', edges: 'held', smooth_nm: 0 },
  features: { threshold: 'otsu', min_area_px: 12, split: true },
} as const;
