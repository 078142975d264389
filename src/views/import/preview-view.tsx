/** A first look at a scan being opened: its brightness as a map, its mean spectrum. */
import { scaleLinear } from 'd3-scale';
import { useMemo } from 'react';
import type { Preview, ScanPlan } from '../../io/scan-plan';
import { colourScale } from '../../science/colour/colour-scales';
import { formatCount } from '../../science/format';
import type { DerivedMap } from '../../science/scan';
import { fieldOf } from '../canvas/field-of';
import { MapThumbnail } from '../map/map-thumbnail';
import { useMapImage } from '../map/use-map-image';
import styles from './import-sheet.module.css';
import { spectrumPath } from './spectrum-path';

const sidePx = 264;
const plotPx = { width: sidePx, height: 96 };

interface Props {
  /** null while it is being made */
  readonly preview: Preview | null;
  readonly plan: ScanPlan | null;
}

export function PreviewView({ preview, plan }: Props): React.JSX.Element {
  const map = useMemo((): DerivedMap | null => {
    if (preview === null) return null;
    const { ny, nx, totals } = preview;
    return { name: 'preview', unit: 'counts', ny, nx, values: totals, errors: null };
  }, [preview]);
  const image = useMapImage(map, colourScale('viridis').table, 'p1', 'p99', 'linear');
  const field = plan === null ? null : fieldOf(plan.meta);
  const aspect = field?.aspect ?? 1;
  const heightPx =
    preview === null
      ? sidePx
      : Math.min(sidePx, Math.max(24, (sidePx * aspect * preview.ny) / preview.nx));
  return (
    <figure className={styles.preview} aria-busy={preview === null}>
      <MapThumbnail image={image} widthPx={sidePx} heightPx={heightPx} aspect={aspect} />
      {preview !== null && plan !== null && <MeanSpectrum preview={preview} plan={plan} />}
      <figcaption>{captionOf(preview, plan)}</figcaption>
    </figure>
  );
}

function MeanSpectrum({ preview, plan }: { preview: Preview; plan: ScanPlan }): React.JSX.Element {
  const { centresEv } = plan.meta.axis;
  const { width, height } = plotPx;
  const { d, low, high } = spectrumPath(centresEv, preview.meanSpectrum, {
    widthPx: width,
    heightPx: height,
  });
  const evToX = scaleLinear([centresEv[0] ?? 0, centresEv[centresEv.length - 1] ?? 1], [0, width]);
  const ticks = evToX.ticks(4);
  const tickText = evToX.tickFormat(4);
  return (
    <svg
      className={styles.spectrum}
      width={width}
      height={height + 18}
      role="img"
      aria-label={`Mean spectrum, ${formatCount(low)} to ${formatCount(high)} per channel`}
    >
      <rect width={width} height={height} className={styles.plot} />
      <path d={d} />
      {ticks.map((energy) => (
        <text key={energy} x={evToX(energy)} y={height + 13} textAnchor="middle">
          {tickText(energy)}
        </text>
      ))}
      <text x={4} y={11}>
        {formatCount(high)}
      </text>
      <text x={width} y={height - 4} textAnchor="end">
        eV
      </text>
    </svg>
  );
}

function captionOf(preview: Preview | null, plan: ScanPlan | null): string {
  if (preview === null) return plan === null ? 'no picture until it can be read' : 'reading …';
  const thinning = preview.step > 1 ? `; every ${preview.step}th pixel` : '';
  return `counts in all channels, and their mean spectrum${thinning}`;
}
