/** Every value at one pixel with its uncertainty: under the crosshair, else at the pin made last. */
import { useMemo } from 'react';
import type { Recipe } from '../../recipe/schema';
import { formatMeasured } from '../../science/format';
import { bandColours } from '../../state/band-colours';
import { componentColours } from '../../state/component-colours';
import {
  fitSuffix,
  grouped,
  labelOf,
  type ValueRow,
  valuesAt,
  withoutMinor,
  withShifts,
} from '../../state/cursor-values';
import { shownMaps } from '../../state/shown-maps';
import side from '../shell/side-column.module.css';
import { useCrosshair, useRecipe, useResults, useSession } from '../workbench-context';
import styles from './values-column.module.css';

export function PixelValues(): React.JSX.Element {
  const hovered = useCrosshair();
  const recipe = useRecipe((document) => document);
  const results = useResults((state) => state.maps);
  const colours = useMemo(() => coloursOfGroups(recipe), [recipe]);
  const laserEv = useSession(({ scan }) => scan?.open.plan.meta.laserEv ?? null);
  const maps = useMemo(() => shownMaps(recipe, results), [recipe, results]);
  const lastPin = recipe.pins?.at(-1);
  const pixel = hovered ?? lastPin ?? null;
  if (pixel === null || maps.length === 0) {
    return (
      <section className={styles.section}>
        <h2 className={side.heading}>Values</h2>
        <p className={side.hint}>Point at a map to read every value there.</p>
      </section>
    );
  }
  const pin = recipe.pins?.find(({ x, y }) => x === pixel.x && y === pixel.y);
  return (
    <section className={styles.section} data-testid="values">
      <h2 className={side.heading}>
        <b>
          Pixel {pixel.x}, {pixel.y}
        </b>
        <span>{pin === undefined ? '' : `${pin.name} ${pin.label ?? ''}`}</span>
      </h2>
      {grouped(withoutMinor(withShifts(valuesAt(maps, pixel), recipe, laserEv))).map(
        ({ group, rows }) => (
          <dl key={group} className={styles.group}>
            {rows.map((row, index) => (
              <Row
                key={row.name}
                row={row}
                title={index === 0 ? group : ''}
                colour={colours.get(group) ?? null}
              />
            ))}
          </dl>
        ),
      )}
    </section>
  );
}

/** Bands, and components of the fit, each in its colour. */
function coloursOfGroups(recipe: Recipe): ReadonlyMap<string, string> {
  const components = [...componentColours(recipe)].map(
    ([name, colour]) => [`${name} ${fitSuffix}`, colour] as const,
  );
  return new Map([...bandColours(recipe), ...components]);
}

interface RowProps {
  readonly row: ValueRow;
  /** name of the group in its first row, "" in the others */
  readonly title: string;
  readonly colour: string | null;
}

function Row({ row, title, colour }: RowProps): React.JSX.Element {
  const text = formatMeasured(row.value, row.error, row.unit);
  const [value, ...rest] = text.split(/(?= [±\p{L}%°])/u);
  const isNamed = title !== '' && colour !== null;
  return (
    <div className={styles.row} data-map={row.name}>
      {isNamed ? (
        <dt className={styles.named} title={labelOf(row.name)}>
          <i style={{ background: colour }} />
          {title}
        </dt>
      ) : (
        <dt>{row.label}</dt>
      )}
      <dd>
        {value}
        <i>{rest.join('')}</i>
      </dd>
    </div>
  );
}
