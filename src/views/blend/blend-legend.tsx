/** Which colour is which: the channels with the ends of their bands. */

import type { FullChannel } from '../../recipe/defaults';
import { channelLabel, channelRange } from '../../state/channel-words';
import type { PlacedBand } from '../../state/placed-bands';
import styles from './blend-pane.module.css';

interface Props {
  readonly channels: readonly FullChannel[];
  readonly bands: readonly PlacedBand[];
}

export function BlendLegend({ channels, bands }: Props): React.JSX.Element {
  // A channel has no name of its own; the same map may be in the blend twice.
  const entries = channels.map((channel, index) => ({
    ...channel,
    key: `${index} ${channel.source}`,
  }));
  return (
    <ul className={styles.legend} aria-label="Channels of the blend">
      {entries.map(({ key, source, colour }) => (
        <li key={key} className={styles.entry}>
          <i style={{ background: colour }} />
          <span>{channelLabel(source)}</span>
          <small>{channelRange(source, bands)}</small>
        </li>
      ))}
    </ul>
  );
}
