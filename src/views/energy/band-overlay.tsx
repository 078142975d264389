/** Bands on the spectrum: drag one to move it, its ends to widen it, empty ground to make a new one. */
import type { ScaleLinear } from 'd3-scale';
import { useMemo, useState } from 'react';
import { addBandBetween, moveBandEnds, selectBand } from '../../state/band-actions';
import { bandColours } from '../../state/band-colours';
import { addPeakAt } from '../../state/model-actions';
import { type PlacedBand, placedBands } from '../../state/placed-bands';
import { useRecipe, useSession, useView, useWorkbench } from '../workbench-context';
import { BandHandle, type DragEnds } from './band-handle';
import styles from './energy-panel.module.css';
import { panelLayout } from './panel-layout';

interface Props {
  readonly evToX: ScaleLinear<number, number>;
  readonly widthPx: number;
  readonly heightPx: number;
}

/** Width of a new peak as a share of the energies shown. */
const startingWidth = 0.04;
/** A drag shorter than this is a click, px. */
const leastDragPx = 4;

export function BandOverlay({ evToX, widthPx, heightPx }: Props): React.JSX.Element {
  const workbench = useWorkbench();
  const scan = useSession((session) => session.scan);
  const recipe = useRecipe((document) => document);
  const selection = useView((view) => view.selection);
  const isAddingPeak = useView((view) => view.isAddingPeak);
  const [draftEv, setDraftEv] = useState<readonly [number, number] | null>(null);
  const bands = useMemo(() => (scan === null ? [] : placedBands(recipe, scan)), [recipe, scan]);
  const colours = useMemo(() => bandColours(recipe), [recipe]);

  const top = panelLayout.plotTopPx;
  const height = heightPx - panelLayout.bottomPx - top;
  const left = panelLayout.leftPx;
  const right = widthPx - panelLayout.rightPx;
  const within = (x: number): number => Math.min(Math.max(x, left), right);
  const evAt = (event: React.PointerEvent<Element>): number => {
    const host = event.currentTarget.closest('svg');
    return evToX.invert(within(event.clientX - (host?.getBoundingClientRect().left ?? 0)));
  };

  const drawNew = (event: React.PointerEvent<SVGRectElement>): void => {
    if (event.button !== 0) return;
    const ev = evAt(event);
    if (isAddingPeak) {
      const [low = 0, high = 1] = evToX.domain();
      workbench.view.setState({ isAddingPeak: false });
      addPeakAt(workbench, ev, (high - low) * startingWidth);
      return;
    }
    event.currentTarget.setPointerCapture(event.pointerId);
    setDraftEv([ev, ev]);
  };
  const followNew = (event: React.PointerEvent<SVGRectElement>): void => {
    const ev = evAt(event);
    workbench.view.setState({ cursorEv: ev });
    if (draftEv !== null) setDraftEv([draftEv[0], ev]);
  };
  const finishNew = (): void => {
    if (draftEv !== null && Math.abs(evToX(draftEv[1]) - evToX(draftEv[0])) >= leastDragPx) {
      addBandBetween(workbench, draftEv[0], draftEv[1]);
    }
    setDraftEv(null);
  };

  const drag = (band: PlacedBand, ends: DragEnds): void => moveBandEnds(workbench, band, ends);
  return (
    <svg className={styles.overlay} width={widthPx} height={heightPx}>
      <title>Bands on the spectrum</title>
      <rect
        className={styles.background}
        data-testid="band-ground"
        x={left}
        y={top}
        width={Math.max(right - left, 0)}
        height={height}
        onPointerDown={drawNew}
        onPointerMove={followNew}
        onPointerUp={finishNew}
        onPointerLeave={() => workbench.view.setState({ cursorEv: null })}
      />
      {draftEv !== null && (
        <rect
          x={Math.min(evToX(draftEv[0]), evToX(draftEv[1]))}
          y={top}
          width={Math.abs(evToX(draftEv[1]) - evToX(draftEv[0]))}
          height={height}
          fill="var(--accent)"
          opacity={0.2}
        />
      )}
      {bands.map((band) => (
        <BandHandle
          key={band.name}
          band={band}
          colour={colours.get(band.name) ?? 'var(--ink-2)'}
          evToX={evToX}
          box={{ left, right, top, height }}
          isSelected={selection.kind === 'band' && selection.name === band.name}
          onSelect={() => selectBand(workbench, band.name)}
          onDrag={(ends) => drag(band, ends)}
          onDragEnd={() => workbench.recipe.endGesture()}
        />
      ))}
    </svg>
  );
}
