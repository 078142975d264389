/** The truth of a demo scan as JSON: everything a fit of the scan should find, to compare with. */
import type { TruthMap } from '../science/scenarios/plan';
import type { SampleScan } from '../science/scenarios/scenario';

/** Decimals kept, well below what any fit of such a scan resolves. */
const decimalsByUnit: Readonly<Record<string, number>> = {
  eV: 5,
  counts: 0,
  'cm-1': 3,
  percent: 4,
  nm: 3,
};

/**
 * The truth as text: constants, pins' places, spikes and maps.
 *
 * A map is `{ unit, values: [[row], …] }`, or `{ unit, value }` where every pixel has the same; spikes are
 * `[y, x, k, counts]` with k counted along the file's axis.
 */
export function sampleTruthJson(scan: SampleScan): string {
  const { truth } = scan;
  const parts = [
    `"scenario": ${JSON.stringify(scan.name)}`,
    `"seed": ${scan.seed}`,
    `"shape": ${JSON.stringify(scan.shape)}`,
    `"pitch_nm": ${scan.pitchNm}`,
    `"laser_nm_air": ${scan.laserNm}`,
    `"constants": ${JSON.stringify(truth.constants)}`,
    `"landmarks": ${JSON.stringify(truth.landmarks)}`,
    `"spikes": ${JSON.stringify(truth.spikes.map(({ y, x, k, counts }) => [y, x, k, counts]))}`,
    `"maps": {\n${truth.maps.map((map) => mapJson(map, scan.shape.nx)).join(',\n')}\n}`,
  ];
  return `{\n${parts.join(',\n')}\n}\n`;
}

function mapJson({ name, unit, values }: TruthMap, nx: number): string {
  const rounded = Array.from(values, (value) => roundedFor(unit, value));
  const first = rounded[0];
  const head = `${JSON.stringify(name)}: { "unit": ${JSON.stringify(unit)}`;
  if (rounded.every((value) => value === first)) return `${head}, "value": ${first} }`;
  const rows = Array.from({ length: rounded.length / nx }, (_, y) =>
    JSON.stringify(rounded.slice(y * nx, (y + 1) * nx)),
  );
  return `${head}, "values": [\n${rows.join(',\n')}\n] }`;
}

function roundedFor(unit: string, value: number): number {
  const scale = Number(`1e${decimalsByUnit[unit] ?? 6}`);
  // + 0 turns −0 into 0
  return Math.round(value * scale) / scale + 0;
}
