/** The colour scale of a map, upright, with the values at its ends. */
import { useEffect, useRef } from 'react';
import type { Limits, Transfer } from '../../science/colour/transfer';
import { planTransfer } from '../../science/colour/transfer';
import { withUnit } from '../../science/format';
import { formatLimit, formatLimits } from '../../science/limit-text';
import styles from './map.module.css';

interface Props {
  /** (n, 3) */
  readonly table: Uint8Array;
  readonly limits: Limits;
  readonly transfer: Transfer;
  readonly unit: string;
}

export function ColourBar({ table, limits, transfer, unit }: Props): React.JSX.Element {
  const canvas = useRef<HTMLCanvasElement>(null);
  useEffect(() => {
    if (canvas.current !== null) drawTable(canvas.current, table);
  }, [table]);
  const { low, high, highWithUnit } = formatLimits(limits, unit);
  const middle = planTransfer(transfer, limits).valueAt(0.5);
  const span = Math.abs(limits.high - limits.low);
  return (
    <div
      className={styles.colourBar}
      role="img"
      aria-label={`Colours from ${withUnit(low, unit)} to ${withUnit(high, unit)}`}
    >
      <span className={styles.colourHigh}>{highWithUnit}</span>
      {transfer !== 'linear' && span > 0 && (
        <span className={styles.colourMiddle}>{formatLimit(middle, span, unit)}</span>
      )}
      <span className={styles.colourLow}>{low}</span>
      <canvas className={styles.colours} ref={canvas} />
    </div>
  );
}

/** High at the top. */
function drawTable(canvas: HTMLCanvasElement, table: Uint8Array): void {
  const entries = table.length / 3;
  canvas.width = 1;
  canvas.height = entries;
  const context = canvas.getContext('2d');
  const image = context?.createImageData(1, entries);
  if (!context || !image) return;
  for (let row = 0; row < entries; row++) {
    const from = 3 * (entries - 1 - row);
    image.data.set([...table.subarray(from, from + 3), 255], 4 * row);
  }
  context.putImageData(image, 0, 0);
}
