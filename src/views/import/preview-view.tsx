/** A first look at a scan being opened: its brightness as a map, its mean spectrum. */
import { useMemo, useState } from 'react';
import type { Preview, ScanPlan } from '../../io/scan-plan';
import { colourScale } from '../../science/colour/colour-scales';
import type { DerivedMap } from '../../science/scan';
import type { ImportDraft } from '../../state/session-store';
import { fieldOf } from '../canvas/field-of';
import { MapThumbnail } from '../map/map-thumbnail';
import { useMapImage } from '../map/use-map-image';
import styles from './import-sheet.module.css';
import { MeanSpectrum } from './mean-spectrum';
import { previewInWords } from './preview-words';

const sidePx = 264;
/** A line of pixels is drawn as a strip that can still be seen. */
const leastHeightPx = 24;

interface Look {
  readonly preview: Preview;
  readonly plan: ScanPlan;
}

export function PreviewView({ draft }: { readonly draft: ImportDraft }): React.JSX.Element {
  const look = useLatestLook(draft);
  const isBusy = draft.isLooking || draft.preview === null;
  if (look === null) {
    const canCome = draft.isLooking || draft.inspection?.plan != null;
    return (
      <p className={styles.nothing}>
        {canCome ? 'Looking …' : 'The map and the mean spectrum come as soon as it can be read.'}
      </p>
    );
  }
  const { preview, plan } = look;
  return (
    <figure className={styles.preview} aria-busy={isBusy}>
      {plan.meta.shape.nx * plan.meta.shape.ny > 1 && <Picture look={look} />}
      <MeanSpectrum preview={preview} plan={plan} widthPx={sidePx} />
      <figcaption>{previewInWords(preview, plan.meta)}</figcaption>
    </figure>
  );
}

/** The last picture stays, dimmed, while the next is made: it changes, it does not flicker. */
function useLatestLook({ preview, inspection, isLooking }: ImportDraft): Look | null {
  const [last, setLast] = useState<Look | null>(null);
  const plan = inspection?.plan ?? null;
  if (!isLooking && preview !== null && plan !== null && last?.preview !== preview) {
    setLast({ preview, plan });
  }
  return plan === null && !isLooking ? null : last;
}

function Picture({ look }: { readonly look: Look }): React.JSX.Element {
  const { preview, plan } = look;
  const { ny, nx, totals } = preview;
  const unit = plan.meta.quantity;
  const map = useMemo(
    (): DerivedMap => ({ name: 'preview', unit, ny, nx, values: totals, errors: null }),
    [ny, nx, totals, unit],
  );
  const image = useMapImage(map, colourScale('viridis').table, 'p1', 'p99', 'linear');
  const { aspect } = fieldOf(plan.meta);
  const heightPx = Math.min(sidePx, Math.max(leastHeightPx, (sidePx * aspect * ny) / nx));
  return <MapThumbnail image={image} widthPx={sidePx} heightPx={heightPx} aspect={aspect} />;
}
