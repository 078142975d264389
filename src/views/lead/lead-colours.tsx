/** How the lead map is coloured: limits, scale, transfer. */
import { memo, useMemo } from 'react';
import { setLeadColours, setLeadLimits, setLeadTransfer } from '../../state/lead-actions';
import { Choice } from '../forms/choice';
import { LimitEntry } from '../forms/limit-entry';
import { useView, useWorkbench } from '../workbench-context';
import styles from './lead-pane.module.css';

const transfers = [
  { id: 'linear', words: 'linear' },
  { id: 'sqrt', words: 'square root' },
  { id: 'log', words: 'logarithmic' },
] as const;
const transferGroups = [{ title: '', items: transfers }];

interface Props {
  /** name of the scale shown */
  readonly scale: string;
  /** names of those that suit the map, apart by spaces: a text, so that equal ones are the same */
  readonly scaleNames: string;
}

/** Drawn again when a setting changes, not with every new map. */
export const LeadColours = memo(({ scale, scaleNames }: Props): React.JSX.Element => {
  const workbench = useWorkbench();
  const low = useView((view) => view.leadLow);
  const high = useView((view) => view.leadHigh);
  const transfer = useView((view) => view.transfer);
  const scales = useMemo(
    () => [{ title: '', items: scaleNames.split(' ').map((name) => ({ id: name, words: name })) }],
    [scaleNames],
  );
  return (
    <fieldset className={styles.colours} aria-label="Colours of the lead map">
      <LimitEntry
        label="Low limit of the lead map"
        value={low}
        onChange={(next) => setLeadLimits(workbench, { low: next, high }, 'low')}
      />
      <span aria-hidden="true">–</span>
      <LimitEntry
        label="High limit of the lead map"
        value={high}
        onChange={(next) => setLeadLimits(workbench, { low, high: next }, 'high')}
      />
      <Choice
        label="Colour scale"
        value={scale}
        groups={scales}
        onChange={(name) => setLeadColours(workbench, name)}
      />
      <Choice
        label="Transfer"
        value={transfer}
        groups={transferGroups}
        onChange={(id) => {
          const chosen = transfers.find((one) => one.id === id);
          if (chosen !== undefined) setLeadTransfer(workbench, chosen.id);
        }}
      />
    </fieldset>
  );
});
