/** The small map of each band, hung above its interval in order of energy and tied to it. */
import type { ScaleLinear } from 'd3-scale';
import { useMemo } from 'react';
import { colourScale } from '../../science/colour/colour-scales';
import type { ScanMeta } from '../../science/scan';
import { bandColours } from '../../state/band-colours';
import { showLeadMap } from '../../state/lead-actions';
import { type PlacedBand, placedBands } from '../../state/placed-bands';
import { fieldOf } from '../canvas/field-of';
import { MapThumbnail } from '../map/map-thumbnail';
import { useMapImage } from '../map/use-map-image';
import { useRecipe, useResults, useSession, useView, useWorkbench } from '../workbench-context';
import styles from './energy-panel.module.css';
import { hangTiles, tiePath } from './hang';
import { panelLayout } from './panel-layout';

interface Props {
  readonly evToX: ScaleLinear<number, number>;
  readonly widthPx: number;
}

/** Room a tile takes with its numbers beside it, and without them when there are many, px. */
const wideSlotPx = panelLayout.tilePx + 66;
const narrowSlotPx = panelLayout.tilePx + 10;

export function HungMaps({ evToX, widthPx }: Props): React.JSX.Element {
  const scan = useSession((session) => session.scan);
  const recipe = useRecipe((document) => document);
  const bands = useMemo(() => (scan === null ? [] : placedBands(recipe, scan)), [recipe, scan]);
  const colours = useMemo(() => bandColours(recipe), [recipe]);
  if (bands.length === 0) {
    return (
      <p className={styles.empty}>
        No bands yet. Drag across the spectrum to make one: its map hangs here.
      </p>
    );
  }
  const fromPx = panelLayout.leftPx;
  const toPx = widthPx - panelLayout.rightPx;
  const isWide = bands.length * wideSlotPx <= toPx - fromPx;
  const slotPx = isWide ? wideSlotPx : Math.min(narrowSlotPx, (toPx - fromPx) / bands.length);
  const tilePx = Math.min(panelLayout.tilePx, slotPx - 4);
  const middles = bands.map((band) => evToX((band.fromEv + band.toEv) / 2));
  const mapPx =
    scan === null ? { widthPx: tilePx, heightPx: tilePx } : sizeIn(tilePx, scan.open.plan.meta);
  const lefts = hangTiles({ centresPx: middles, slotPx, fromPx, toPx });
  return (
    <>
      <svg
        className={styles.ties}
        width={widthPx}
        height={panelLayout.plotTopPx}
        aria-hidden="true"
      >
        {bands.map((band, index) => {
          const middle = middles[index] ?? 0;
          if (middle < fromPx || middle > toPx) return null;
          const tile = {
            x: (lefts[index] ?? 0) + tilePx / 2,
            y: panelLayout.tileTopPx + tilePx + 2,
          };
          const d = tiePath(tile, { x: middle, y: panelLayout.plotTopPx });
          return (
            <path key={band.name} className={styles.tie} d={d} stroke={colours.get(band.name)} />
          );
        })}
      </svg>
      {bands.map((band, index) => (
        <HungMap
          key={band.name}
          band={band}
          colour={colours.get(band.name) ?? '#ffffff'}
          leftPx={lefts[index] ?? 0}
          tilePx={tilePx}
          mapPx={mapPx}
          withRange={isWide}
        />
      ))}
    </>
  );
}

/** The map's size within its tile, in proportion; it stands on the tile's lower edge, where its tie begins. */
function sizeIn(tilePx: number, meta: ScanMeta): TileProps['mapPx'] {
  const { nx, ny, aspect } = fieldOf(meta);
  const high = (ny * aspect) / nx;
  return {
    widthPx: high > 1 ? tilePx / high : tilePx,
    heightPx: high > 1 ? tilePx : tilePx * high,
  };
}

interface TileProps {
  readonly band: PlacedBand;
  readonly colour: string;
  readonly leftPx: number;
  readonly tilePx: number;
  readonly mapPx: { readonly widthPx: number; readonly heightPx: number };
  readonly withRange: boolean;
}

function HungMap({ band, colour, leftPx, tilePx, mapPx, withRange }: TileProps): React.JSX.Element {
  const workbench = useWorkbench();
  const name = `band.${band.name}.integral`;
  const map = useResults((results) => results.maps.get(name) ?? null);
  const isLead = useView((view) => view.leadMap.startsWith(`band.${band.name}.`));
  const table = useMemo(() => colourScale(colour).table, [colour]);
  const image = useMapImage(map, table, 'p1', 'p99.5', 'linear');
  return (
    <button
      type="button"
      className={isLead ? `${styles.tile} ${styles.lead}` : styles.tile}
      style={{ left: leftPx, width: tilePx }}
      onClick={() => showLeadMap(workbench, name)}
      aria-pressed={isLead}
      aria-label={`Map of band ${band.name}: show as the lead map`}
    >
      <span className={styles.tileName}>{band.name}</span>
      <span className={styles.tileMap} style={{ width: tilePx, height: tilePx }}>
        <MapThumbnail image={image} {...mapPx} />
      </span>
      {withRange && (
        <span className={styles.tileRange} style={{ left: tilePx + 7 }}>
          {band.fromEv.toFixed(3)}
          <br />
          {band.toEv.toFixed(3)} eV
        </span>
      )}
    </button>
  );
}
