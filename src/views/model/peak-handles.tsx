/** The model's peaks on the spectrum while it is being worked on: pull one to move it, its sides to widen it. */
import type { ScaleLinear } from 'd3-scale';
import { useMemo, useRef } from 'react';
import { componentColours } from '../../state/component-colours';
import { movePeak, selectComponent } from '../../state/model-actions';
import { type PlacedPeak, placedPeaks } from '../../state/placed-peaks';
import { useRecipe, useSession, useView, useWorkbench } from '../workbench-context';
import styles from './peak-handles.module.css';

interface Props {
  readonly evToX: ScaleLinear<number, number>;
  readonly widthPx: number;
  readonly heightPx: number;
  readonly box: {
    readonly left: number;
    readonly right: number;
    readonly top: number;
    readonly height: number;
  };
}

export function PeakHandles({ evToX, widthPx, heightPx, box }: Props): React.JSX.Element | null {
  const selection = useView((view) => view.selection);
  const isShown = selection.kind === 'model' || selection.kind === 'component';
  const recipe = useRecipe((document) => document);
  const scan = useSession((session) => session.scan);
  const peaks = useMemo(
    () => (scan === null || !isShown ? [] : placedPeaks(recipe, scan)),
    [recipe, scan, isShown],
  );
  const colours = useMemo(() => componentColours(recipe), [recipe]);
  if (peaks.length === 0) return null;
  return (
    <svg className={styles.layer} width={widthPx} height={heightPx}>
      <title>Peaks of the model</title>
      {peaks.map((peak) => (
        <PeakHandle
          key={peak.name}
          peak={peak}
          colour={colours.get(peak.name) ?? 'var(--ink)'}
          evToX={evToX}
          box={box}
          isSelected={selection.kind === 'component' && selection.name === peak.name}
        />
      ))}
    </svg>
  );
}

interface HandleProps {
  readonly peak: PlacedPeak;
  readonly colour: string;
  readonly evToX: ScaleLinear<number, number>;
  readonly box: Props['box'];
  readonly isSelected: boolean;
}

/** `low` and `high`: the sides at half height. */
type Grip = 'centre' | 'low' | 'high';

function PeakHandle(props: HandleProps): React.JSX.Element | null {
  const { peak, colour, evToX, box, isSelected } = props;
  const workbench = useWorkbench();
  const start = useRef<{ grip: Grip; x: number; peak: PlacedPeak } | null>(null);
  const x = evToX(peak.centreEv);
  if (x < box.left || x > box.right) return null;
  // Below the residuals.
  const y = box.top + 40;

  const grab = (grip: Grip) => (event: React.PointerEvent<SVGElement>) => {
    if (event.button !== 0) return;
    event.currentTarget.setPointerCapture(event.pointerId);
    start.current = { grip, x: event.clientX, peak };
    selectComponent(workbench, peak.name);
  };
  const move = (event: React.PointerEvent<SVGElement>): void => {
    const from = start.current;
    if (from === null || event.clientX === from.x) return;
    const byEv = evToX.invert(event.clientX) - evToX.invert(from.x);
    const { centreEv, fwhmEv } = from.peak;
    if (from.grip === 'centre') {
      movePeak(workbench, peak.name, { centreEv: centreEv + byEv });
    } else if (fwhmEv !== null) {
      const wider = fwhmEv + 2 * (from.grip === 'high' ? byEv : -byEv);
      if (wider > 0) movePeak(workbench, peak.name, { fwhmEv: wider });
    }
  };
  const release = (): void => {
    if (start.current !== null) workbench.recipe.endGesture();
    start.current = null;
  };
  const step = (event: React.KeyboardEvent<SVGElement>): void => {
    const sign = event.key === 'ArrowLeft' ? -1 : event.key === 'ArrowRight' ? 1 : 0;
    if (sign === 0) return;
    event.preventDefault();
    event.stopPropagation();
    const [low = 0, high = 1] = evToX.domain();
    const byEv = (sign * (high - low) * (event.shiftKey ? 10 : 1)) / 1000;
    movePeak(workbench, peak.name, { centreEv: peak.centreEv + byEv });
  };
  const gripOf = (grip: Grip) => ({
    onPointerDown: grab(grip),
    onPointerMove: move,
    onPointerUp: release,
    onPointerCancel: release,
  });
  return (
    <g data-peak={peak.name} className={isSelected ? styles.selected : undefined}>
      <line
        className={styles.stem}
        x1={x}
        x2={x}
        y1={y}
        y2={box.top + box.height}
        stroke={colour}
      />
      {peak.fwhmEv !== null &&
        (['low', 'high'] as const).map((grip) => (
          <rect
            key={grip}
            className={styles.side}
            x={evToX(peak.centreEv + (grip === 'high' ? 0.5 : -0.5) * (peak.fwhmEv ?? 0)) - 3}
            y={y + 8}
            width={6}
            height={14}
            rx={2}
            fill={colour}
            {...gripOf(grip)}
          />
        ))}
      <circle
        className={styles.handle}
        cx={x}
        cy={y}
        r={7}
        fill={colour}
        role="slider"
        tabIndex={0}
        aria-label={`Centre of ${peak.name}`}
        aria-valuenow={Number(peak.centreEv.toFixed(5))}
        aria-valuetext={`${peak.centreEv.toFixed(4)} eV`}
        onKeyDown={step}
        onKeyUp={() => workbench.recipe.endGesture()}
        {...gripOf('centre')}
      />
      <text x={x + 11} y={y + 4}>
        {peak.name}
      </text>
    </g>
  );
}
