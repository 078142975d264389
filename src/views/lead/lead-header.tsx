/** Top of the lead pane: which map, its limits in numbers, and how much of it is seen. */

import { useCallback } from 'react';
import { Button } from 'react-aria-components';
import { useStore } from 'zustand';
import { withUnit } from '../../science/format';
import { formatLimits } from '../../science/limit-text';
import { showLeadMap, toggleLeadError } from '../../state/lead-actions';
import { sharedCamera } from '../canvas/shared-camera';
import { Choice } from '../forms/choice';
import { useResults, useWorkbench } from '../workbench-context';
import styles from './lead-pane.module.css';
import type { LeadMap } from './use-lead-map';

interface Props {
  readonly lead: LeadMap;
  readonly onOneToOne: () => void;
}

export function LeadHeader({ lead, onOneToOne }: Props): React.JSX.Element {
  const workbench = useWorkbench();
  const { choice, items, limits, unit } = lead;
  const plainName = choice.name.replace(/\.err$/, '');
  const isError = plainName !== choice.name;
  const hasErrors = useResults(({ maps }) => (maps.get(plainName)?.errors ?? null) !== null);
  const text = formatLimits(limits, unit);
  const show = useCallback((name: string) => showLeadMap(workbench, name), [workbench]);
  return (
    <div className={styles.caption}>
      <Choice look="title" label="Lead map" value={plainName} groups={items} onChange={show} />
      <small className={styles.limits} data-testid="lead-limits">
        {lead.map === null ? 'being made' : `${text.low} – ${withUnit(text.high, unit)}`}
      </small>
      <span className={styles.tools}>
        {hasErrors && (
          <button
            type="button"
            className={styles.tool}
            aria-pressed={isError}
            aria-label="Show the 1-σ uncertainty"
            onClick={() => toggleLeadError(workbench)}
          >
            ±
          </button>
        )}
        <ZoomTools onOneToOne={onOneToOne} />
      </span>
    </div>
  );
}

function ZoomTools({ onOneToOne }: { readonly onOneToOne: () => void }): React.JSX.Element {
  const zoom = useStore(sharedCamera, (camera) => camera.zoom);
  const isFitted = Math.abs(zoom - 1) < 1e-6;
  return (
    <>
      <output className={styles.zoom} aria-label="Zoom">
        {zoom.toFixed(zoom < 10 ? 1 : 0)}×
      </output>
      <Button
        className={styles.tool ?? ''}
        aria-label="One pixel of the map on one of the screen"
        onPress={onOneToOne}
      >
        1:1
      </Button>
      <button
        type="button"
        className={styles.tool}
        aria-pressed={isFitted}
        aria-label="Fit the whole map"
        onClick={() => sharedCamera.fit()}
      >
        fit
      </button>
    </>
  );
}
