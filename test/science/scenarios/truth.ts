/** Reading a scenario's truth and noiseless spectra in tests. */
import { expectedSignal, type ScenarioPlan } from '../../../src/science/scenarios/plan';
import type { SampleTruth } from '../../../src/science/scenarios/scenario';

export function truthMap(truth: SampleTruth, name: string): Float64Array {
  const found = truth.maps.find((map) => map.name === name);
  if (found === undefined) throw new Error(`no map ${name}`);
  return found.values;
}

/** The noiseless spectrum of one peak alone, file order. */
export function signalOf(plan: ScenarioPlan, peak: string, pixel: number): Float64Array {
  const peaks = plan.peaks.filter(({ name }) => name === peak);
  const floor = new Float64Array(plan.shape.nk);
  return expectedSignal({ ...plan, peaks, floor }, pixel, new Float64Array(plan.shape.nk));
}

/** Area, centroid and RMS width of a spectrum, by summing over channels. */
export function momentsOf(plan: ScenarioPlan, spectrum: Float64Array) {
  const { centresEv } = plan.axis;
  const area = spectrum.reduce((sum, c) => sum + c, 0);
  const mean = spectrum.reduce((sum, c, k) => sum + c * centresEv[k]!, 0) / area;
  const variance = spectrum.reduce((sum, c, k) => sum + c * (centresEv[k]! - mean) ** 2, 0) / area;
  return { area, centroid: mean, spread: Math.sqrt(variance) };
}

export function median(values: Iterable<number>): number {
  const sorted = [...values].sort((a, b) => a - b);
  return sorted[Math.floor(sorted.length / 2)]!;
}
