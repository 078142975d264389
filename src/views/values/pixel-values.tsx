/** Every value at one pixel with its uncertainty: under the crosshair, else at the pin made last. */
import { useMemo } from 'react';
import { formatMeasured } from '../../science/format';
import { bandColours } from '../../state/band-colours';
import { grouped, labelOf, type ValueRow, valuesAt, withShifts } from '../../state/cursor-values';
import { shownMaps } from '../../state/shown-maps';
import side from '../shell/side-column.module.css';
import { useCrosshair, useRecipe, useResults, useSession } from '../workbench-context';
import styles from './values-column.module.css';

export function PixelValues(): React.JSX.Element {
  const hovered = useCrosshair();
  const recipe = useRecipe((document) => document);
  const results = useResults((state) => state.maps);
  const colours = useMemo(() => bandColours(recipe), [recipe]);
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
      {grouped(withShifts(valuesAt(maps, pixel), recipe, laserEv)).map(({ group, rows }) => (
        <dl key={group} className={styles.group}>
          {rows.map((row, index) => (
            <Row key={row.name} row={row} colour={index === 0 ? colours.get(group) : undefined} />
          ))}
        </dl>
      ))}
    </section>
  );
}

interface RowProps {
  readonly row: ValueRow;
  /** of the band, in the first row of its group, which carries the band's name */
  readonly colour: string | undefined;
}

function Row({ row, colour }: RowProps): React.JSX.Element {
  const text = formatMeasured(row.value, row.error, row.unit);
  const [value, ...rest] = text.split(/(?= [±\p{L}%°])/u);
  return (
    <div className={styles.row} data-map={row.name}>
      {colour === undefined ? (
        <dt>{row.label}</dt>
      ) : (
        <dt className={styles.named} title={labelOf(row.name)}>
          <i style={{ background: colour }} />
          {row.group}
        </dt>
      )}
      <dd>
        {value}
        <i>{rest.join('')}</i>
      </dd>
    </div>
  );
}
