/** maps.h5: every map as NXdata with its unit and uncertainty, the recipe, and which scan they are of. */
import type { Hdf5Attributes, Hdf5Dataset, Hdf5Group, Hdf5Node } from '../io/write/hdf5';
import type { DerivedMap, PositionAxis, ScanMeta } from '../science/scan';

export interface MapsFile {
  readonly meta: ScanMeta;
  readonly maps: readonly DerivedMap[];
  /** the recipe's own text */
  readonly recipeText: string;
  /** of the scan file */
  readonly sha256: string;
  readonly version: string;
}

/**
 * The file as a tree: /entry/NAME is the NXdata of map NAME, with `data`, `data_errors` where there are
 * any, and the positions `y` and `x`; /entry/recipe and /entry/scan say where they came from.
 *
 * @see NeXus definitions, NXdata: `signal`, `axes`, FIELDNAME_errors
 */
export function mapsTree({ meta, maps, recipeText, sha256, version }: MapsFile): Hdf5Group {
  const [first] = maps;
  return group(
    { NX_class: 'NXroot', default: 'entry', creator: 'Rimlight', creator_version: version },
    {
      entry: group(
        { NX_class: 'NXentry', ...(first === undefined ? {} : { default: first.name }) },
        {
          ...Object.fromEntries(maps.map((map) => [map.name, mapGroup(map, meta)])),
          recipe: group(
            { NX_class: 'NXnote' },
            {
              type: dataset('application/json'),
              data: dataset(recipeText),
            },
          ),
          scan: group(
            { NX_class: 'NXnote' },
            {
              file_name: dataset(meta.name),
              sha256: dataset(sha256),
            },
          ),
        },
      ),
    },
  );
}

function mapGroup({ name, unit, ny, nx, values, errors }: DerivedMap, meta: ScanMeta): Hdf5Group {
  const shape = [ny, nx];
  const units = unit === '' ? '1' : unit;
  return group(
    { NX_class: 'NXdata', signal: 'data', axes: ['y', 'x'] },
    {
      data: { kind: 'dataset', data: values, shape, attributes: { units, long_name: name } },
      ...(errors !== null && {
        data_errors: {
          kind: 'dataset' as const,
          data: errors,
          shape,
          attributes: { units, long_name: `1-sigma uncertainty of ${name}` },
        },
      }),
      y: positions(meta.y, ny),
      x: positions(meta.x, nx),
    },
  );
}

function positions({ label, unit, pitch, values }: PositionAxis, count: number): Hdf5Dataset {
  const data = values ?? Float64Array.from({ length: count }, (_, index) => index * pitch);
  return { kind: 'dataset', data, attributes: { units: unit, long_name: label } };
}

function group(
  attributes: Hdf5Attributes,
  children: Readonly<Record<string, Hdf5Node>>,
): Hdf5Group {
  return { kind: 'group', attributes, children };
}

function dataset(data: string): Hdf5Dataset {
  return { kind: 'dataset', data };
}
