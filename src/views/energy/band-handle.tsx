/** One band on the spectrum with its two ends; by pointer or by keys. */
import type { ScaleLinear } from 'd3-scale';
import { useRef } from 'react';
import type { PlacedBand } from '../../state/placed-bands';
import styles from './energy-panel.module.css';

/** Where a drag puts the two ends, eV. */
export interface DragEnds {
  readonly fromEv: number;
  readonly toEv: number;
}

interface Props {
  readonly band: PlacedBand;
  readonly colour: string;
  readonly evToX: ScaleLinear<number, number>;
  readonly box: { left: number; right: number; top: number; height: number };
  readonly isSelected: boolean;
  readonly onSelect: () => void;
  readonly onDrag: (ends: DragEnds) => void;
  readonly onDragEnd: () => void;
}

type Grip = 'from' | 'to' | 'both';

/** Half the width of an end's grip, px: wide enough for a finger's worth of error. */
const gripPx = 5;

export function BandHandle(props: Props): React.JSX.Element | null {
  const { band, colour, evToX, box, isSelected, onSelect, onDrag, onDragEnd } = props;
  const start = useRef<{ grip: Grip; x: number; fromEv: number; toEv: number } | null>(null);

  const x0 = Math.max(evToX(band.fromEv), box.left);
  const x1 = Math.min(evToX(band.toEv), box.right);
  if (x1 < box.left || x0 > box.right) return null;

  const grab = (grip: Grip) => (event: React.PointerEvent<SVGElement>) => {
    if (event.button !== 0) return;
    event.currentTarget.setPointerCapture(event.pointerId);
    start.current = { grip, x: event.clientX, fromEv: band.fromEv, toEv: band.toEv };
    onSelect();
  };
  const move = (event: React.PointerEvent<SVGElement>): void => {
    const from = start.current;
    if (from === null || event.clientX === from.x) return;
    const byEv = evToX.invert(event.clientX) - evToX.invert(from.x);
    const fromEv = from.grip === 'to' ? from.fromEv : from.fromEv + byEv;
    const toEv = from.grip === 'from' ? from.toEv : from.toEv + byEv;
    if (fromEv < toEv) onDrag({ fromEv, toEv });
  };
  const release = (): void => {
    if (start.current !== null) onDragEnd();
    start.current = null;
  };
  const step = (grip: Grip) => (event: React.KeyboardEvent<SVGElement>) => {
    const sign = event.key === 'ArrowLeft' ? -1 : event.key === 'ArrowRight' ? 1 : 0;
    if (sign === 0) return;
    event.preventDefault();
    event.stopPropagation();
    const [low = 0, high = 1] = evToX.domain();
    const byEv = (sign * (high - low) * (event.shiftKey ? 10 : 1)) / 1000;
    const fromEv = band.fromEv + (grip === 'to' ? 0 : byEv);
    const toEv = band.toEv + (grip === 'from' ? 0 : byEv);
    if (fromEv < toEv) onDrag({ fromEv, toEv });
  };
  const gripProps = (grip: Grip, label: string, ev: number) => ({
    role: 'slider',
    tabIndex: 0,
    'aria-label': label,
    'aria-valuenow': Number(ev.toFixed(5)),
    'aria-valuetext': `${ev.toFixed(4)} eV`,
    onPointerDown: grab(grip),
    onPointerMove: move,
    onPointerUp: release,
    onPointerCancel: release,
    onKeyDown: step(grip),
    onKeyUp: onDragEnd,
    onFocus: onSelect,
  });
  const middleEv = (band.fromEv + band.toEv) / 2;
  const width = Math.max(x1 - x0, 2);
  return (
    <g className={isSelected ? styles.selected : undefined} data-band={band.name}>
      <rect
        className={styles.band}
        x={x0}
        y={box.top}
        width={width}
        height={box.height}
        fill={colour}
        {...gripProps('both', `Band ${band.name}`, middleEv)}
      />
      <rect x={x0} y={box.top} width={width} height={3} fill={colour} pointerEvents="none" />
      <rect
        className={styles.edge}
        x={x0 - gripPx}
        y={box.top}
        width={gripPx * 2}
        height={box.height}
        {...gripProps('from', `Lower end of band ${band.name}`, band.fromEv)}
      />
      <rect
        className={styles.edge}
        x={x0 + width - gripPx}
        y={box.top}
        width={gripPx * 2}
        height={box.height}
        {...gripProps('to', `Upper end of band ${band.name}`, band.toEv)}
      />
    </g>
  );
}
