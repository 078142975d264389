/** summary.json: what came out in a few numbers, and how it came about. A public form: fields are only ever added. */
import type { ScanFit } from '../../workers/engine';
import type { Inspection } from '../io/scan-plan';
import type { DerivedMap, ScanMeta } from '../science/scan';
import { quantiles } from '../science/statistics/quantile';
import { fitRecord } from './fit-maps';
import { scanRecord } from './inspect-json';
import type { RecipeFile } from './recipe-file';

export interface SummaryParts {
  readonly version: string;
  readonly inspection: Inspection;
  readonly meta: ScanMeta;
  readonly scanBytes: number;
  readonly scanSha256: string;
  readonly recipeFile: RecipeFile;
  readonly maps: readonly DerivedMap[];
  /** null for a recipe without a model */
  readonly fit: ScanFit | null;
  readonly workers: number;
  readonly timings: Readonly<Record<string, number>>;
  readonly warnings: readonly string[];
}

export function summaryText(parts: SummaryParts): string {
  const { version, inspection, meta, scanBytes, scanSha256, recipeFile, maps } = parts;
  const record = {
    program: { name: 'rimlight', version, node: process.versions.node },
    scan: {
      file: inspection.fileName,
      format: inspection.format,
      bytes: scanBytes,
      sha256: scanSha256,
      ...scanRecord(meta),
      read_as: inspection.guesses.map(({ field, label, source }) => ({
        field,
        value: label,
        source,
      })),
    },
    recipe: { file: recipeFile.name, title: recipeFile.recipe.title ?? null },
    maps: Object.fromEntries(maps.map((map) => [map.name, mapRecord(map)])),
    ...(parts.fit === null ? {} : { fit: fitRecord(parts.fit) }),
    warnings: parts.warnings,
    workers: parts.workers,
    timings_s: parts.timings,
  };
  return `${JSON.stringify(record, null, 2)}\n`;
}

/** NaN, where a map has no value at all, becomes null. */
function mapRecord({ unit, values, errors }: DerivedMap) {
  const [lower_quartile, median, upper_quartile] = quantiles(values, [0.25, 0.5, 0.75]);
  return {
    unit,
    pixels: values.reduce((count, value) => count + (Number.isNaN(value) ? 0 : 1), 0),
    median,
    lower_quartile,
    upper_quartile,
    median_err: errors === null ? null : quantiles(errors, [0.5])[0],
  };
}
