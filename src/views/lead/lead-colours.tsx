/** How the lead map is coloured: limits, scale, transfer. */
import { setLeadColours, setLeadLimits, setLeadTransfer } from '../../state/lead-actions';
import { Choice } from '../forms/choice';
import { LimitEntry } from '../forms/limit-entry';
import { useView, useWorkbench } from '../workbench-context';
import styles from './lead-pane.module.css';
import { suitableScales } from './lead-scale';
import type { LeadMap } from './use-lead-map';

const transfers = [
  { id: 'linear', words: 'linear' },
  { id: 'sqrt', words: 'square root' },
  { id: 'log', words: 'logarithmic' },
] as const;

export function LeadColours({ lead }: { readonly lead: LeadMap }): React.JSX.Element {
  const workbench = useWorkbench();
  const low = useView((view) => view.leadLow);
  const high = useView((view) => view.leadHigh);
  const transfer = useView((view) => view.transfer);
  const scales = suitableScales(lead.limits).map((name) => ({ id: name, words: name }));
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
        value={lead.scale}
        groups={[{ title: '', items: scales }]}
        onChange={(name) => setLeadColours(workbench, name)}
      />
      <Choice
        label="Transfer"
        value={transfer}
        groups={[{ title: '', items: transfers }]}
        onChange={(id) => {
          const chosen = transfers.find((one) => one.id === id);
          if (chosen !== undefined) setLeadTransfer(workbench, chosen.id);
        }}
      />
    </fieldset>
  );
}
