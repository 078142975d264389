/** pixels.csv: one row a pixel, its place, and every map's value there. */
import type { CsvColumn } from '../io/write/csv';
import type { DerivedMap, PositionAxis, ScanMeta } from '../science/scan';

/** Columns y, x (indices), their positions with the unit in the name, and each map with its `.err`. */
export function pixelColumns(meta: ScanMeta, maps: readonly DerivedMap[]): readonly CsvColumn[] {
  const { ny, nx } = meta.shape;
  const along = (of: (y: number, x: number) => number): Float64Array =>
    Float64Array.from({ length: ny * nx }, (_, pixel) => of(Math.floor(pixel / nx), pixel % nx));
  return [
    { name: 'y', values: along((y) => y) },
    { name: 'x', values: along((_, x) => x) },
    ...positionColumn(meta.y, along, (y) => y),
    ...positionColumn(meta.x, along, (_, x) => x),
    ...maps.flatMap(({ name, values, errors }) => [
      { name, values },
      ...(errors === null ? [] : [{ name: `${name}.err`, values: errors }]),
    ]),
  ];
}

/** None where a pixel's place is its index. */
function positionColumn(
  { label, unit, pitch, values }: PositionAxis,
  along: (of: (y: number, x: number) => number) => Float64Array,
  indexOf: (y: number, x: number) => number,
): readonly CsvColumn[] {
  if (unit === 'px') return [];
  const positionOf = (index: number): number => (values === null ? index * pitch : values[index]);
  return [{ name: `${label}_${unit}`, values: along((y, x) => positionOf(indexOf(y, x))) }];
}
