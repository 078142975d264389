/** Which colour is which: the channels with the ends of their bands. */

import type { FullChannel } from '../../recipe/defaults';
import { channelLabel, channelRange } from '../../state/channel-words';
import type { PlacedBand } from '../../state/placed-bands';
import styles from './blend-pane.module.css';

interface Props {
  readonly channels: readonly FullChannel[];
  readonly bands: readonly PlacedBand[];
}

/** Up to so many channels there is room for the ends of their bands. */
const mostRanges = 3;

export function BlendLegend({ channels, bands }: Props): React.JSX.Element {
  // A channel has no name of its own; the same map may be in the blend twice.
  const entries = channels.map((channel, index) => ({
    ...channel,
    key: `${index} ${channel.source}`,
  }));
  const withRanges = channels.length <= mostRanges;
  const hasRange = withRanges && entries.some(({ source }) => channelRange(source, bands) !== '');
  return (
    <ul className={styles.legend} aria-label="Channels of the blend">
      {entries.map(({ key, source, colour }) => (
        <li key={key} className={styles.entry} title={channelTitle(source, bands)}>
          <i style={{ background: colour }} />
          <span>{channelLabel(source)}</span>
          {withRanges && <small>{channelRange(source, bands)}</small>}
        </li>
      ))}
      {hasRange && (
        <li className={styles.entry}>
          <small>eV</small>
        </li>
      )}
    </ul>
  );
}

function channelTitle(source: string, bands: readonly PlacedBand[]): string {
  const range = channelRange(source, bands);
  return range === '' ? channelLabel(source) : `${channelLabel(source)}, ${range} eV`;
}
