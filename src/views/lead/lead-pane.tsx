/** The lead pane: any one map, large. */
import { useRef } from 'react';
import { formatMeasured } from '../../science/format';
import type { ScanMeta } from '../../science/scan';
import type { Pixel } from '../../state/crosshair';
import { fieldOf } from '../canvas/field-of';
import { sharedCamera } from '../canvas/shared-camera';
import { ColourBar } from '../map/colour-bar';
import { MapCanvas } from '../map/map-canvas';
import { useSession, useView } from '../workbench-context';
import { LeadColours } from './lead-colours';
import { LeadHeader } from './lead-header';
import styles from './lead-pane.module.css';
import { suitableScales } from './lead-scale';
import { useLeadMap } from './use-lead-map';

export function LeadPane(): React.JSX.Element | null {
  const meta = useSession((session) => session.scan?.open.plan.meta ?? null);
  return meta === null ? null : <LeadOfScan meta={meta} />;
}

function LeadOfScan({ meta }: { readonly meta: ScanMeta }): React.JSX.Element {
  const stage = useRef<HTMLDivElement>(null);
  const transfer = useView((view) => view.transfer);
  const lead = useLeadMap();
  const { choice, map, image, limits, table } = lead;

  const describePixel = ({ y, x }: Pixel): string => {
    if (map === null) return '';
    const index = y * map.nx + x;
    const error = map.errors?.[index] ?? null;
    return formatMeasured(map.values[index] ?? Number.NaN, error, map.unit);
  };
  const showOneToOne = (): void => {
    if (stage.current === null) return;
    const { clientWidth: widthPx, clientHeight: heightPx } = stage.current;
    sharedCamera.oneToOne(fieldOf(meta), { widthPx, heightPx });
  };
  const hasValues = Number.isFinite(limits.low) && Number.isFinite(limits.high);
  return (
    <section className={styles.pane} aria-label="Lead map">
      <LeadHeader lead={lead} onOneToOne={showOneToOne} />
      <LeadColours scale={lead.scale} scaleNames={suitableScales(limits).join(' ')} />
      <MapCanvas
        stageRef={stage}
        meta={meta}
        image={image}
        label={choice.title}
        describePixel={describePixel}
        corner={
          hasValues && (
            <ColourBar table={table} limits={limits} transfer={transfer} unit={lead.unit} />
          )
        }
        message={map !== null && !hasValues ? 'This map has no value at any pixel.' : null}
      />
    </section>
  );
}
