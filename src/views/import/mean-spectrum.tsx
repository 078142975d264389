/** The mean spectrum of a scan being opened, over photon energy. */
import { scaleLinear } from 'd3-scale';
import { useMemo } from 'react';
import type { Preview, ScanPlan } from '../../io/scan-plan';
import styles from './import-sheet.module.css';
import { rangeInWords } from './preview-words';
import { spectrumPath } from './spectrum-path';

interface Props {
  readonly preview: Preview;
  readonly plan: ScanPlan;
  readonly widthPx: number;
}

const heightPx = 104;
/** above the line stands its range */
const padPx = { top: 18, bottom: 4 };
/** half a tick's words, and the room of the unit at the right */
const tickRoomPx = { left: 16, right: 40 };

export function MeanSpectrum({ preview, plan, widthPx }: Props): React.JSX.Element {
  const { axis, quantity } = plan.meta;
  const { centresEv } = axis;
  const { meanSpectrum } = preview;
  const { d, low, high } = useMemo(() => {
    const box = { widthPx, heightPx: heightPx - padPx.top - padPx.bottom };
    return spectrumPath(centresEv, meanSpectrum, box);
  }, [centresEv, meanSpectrum, widthPx]);
  const evToX = scaleLinear(
    [centresEv[0] ?? 0, centresEv[centresEv.length - 1] ?? 1],
    [0, widthPx],
  );
  const tickText = evToX.tickFormat(4);
  const ticks = evToX
    .ticks(4)
    .filter((ev) => evToX(ev) >= tickRoomPx.left && evToX(ev) <= widthPx - tickRoomPx.right);
  const range = rangeInWords(low, high, quantity);
  return (
    <svg
      className={styles.spectrum}
      width={widthPx}
      height={heightPx + 18}
      role="img"
      aria-label={`Mean spectrum, ${range} in a channel`}
    >
      <rect width={widthPx} height={heightPx} className={styles.plot} />
      {ticks.map((ev) => (
        <line key={ev} x1={evToX(ev)} x2={evToX(ev)} y1={0} y2={heightPx} />
      ))}
      <path d={d} transform={`translate(0 ${padPx.top})`} />
      <text x={5} y={12}>
        {range}
      </text>
      {ticks.map((ev) => (
        <text key={ev} x={evToX(ev)} y={heightPx + 14} textAnchor="middle">
          {tickText(ev)}
        </text>
      ))}
      <text x={widthPx} y={heightPx + 14} textAnchor="end">
        eV
      </text>
    </svg>
  );
}
