/** One channel of the blend: its map, colour, limits and gamma. Each change is an edit; a drag is one. */
import { X } from 'lucide-react';
import { memo, useMemo } from 'react';
import { Button } from 'react-aria-components';
import type { FullChannel } from '../../recipe/defaults';
import { formatLimits } from '../../science/limit-text';
import type { LimitPair } from '../../science/limits';
import {
  removeChannel,
  setChannelColour,
  setChannelGamma,
  setChannelLimits,
  setChannelSource,
} from '../../state/blend-actions';
import { channelLabel } from '../../state/channel-words';
import { Choice, type ChoiceItems } from '../forms/choice';
import { LimitEntry } from '../forms/limit-entry';
import { RangeSlider } from '../forms/range-slider';
import { limitsOf } from '../map/map-limits';
import { useWorkbench } from '../workbench-context';
import styles from './blend-settings.module.css';
import { gammaOfHand, handOfGamma } from './gamma-hand';
import { LimitSlider } from './limit-slider';
import { useSource } from './use-source';

interface Props {
  readonly channel: FullChannel;
  readonly index: number;
  readonly choices: readonly ChoiceItems[];
}

/** Drawn again when the channel changes, not with every new map: a band may be in the hand. */
export const ChannelSettings = memo(({ channel, index, choices }: Props): React.JSX.Element => {
  const workbench = useWorkbench();
  const { source, colour, low, high, gamma } = channel;
  const offered = useMemo(() => withSource(choices, source), [choices, source]);
  const name = `channel ${index + 1}, ${channelLabel(source)}`;
  const endGesture = (): void => workbench.recipe.endGesture();
  const setLimits = (limits: LimitPair, moved: 'low' | 'high'): void =>
    setChannelLimits(workbench, index, limits, moved);
  return (
    <li className={styles.channel} aria-label={`Channel ${index + 1}, ${channelLabel(source)}`}>
      <div className={styles.source}>
        <input
          type="color"
          className={styles.colour}
          aria-label={`Colour of ${name}`}
          value={sixDigits(colour)}
          onChange={(event) => setChannelColour(workbench, index, event.target.value)}
          onBlur={endGesture}
        />
        <Choice
          label={`Map of ${name}`}
          value={source}
          groups={offered}
          onChange={(next) => setChannelSource(workbench, index, next)}
        />
        <Button
          className={styles.remove ?? ''}
          aria-label={`Remove ${name}`}
          onPress={() => removeChannel(workbench, index)}
        >
          <X size={13} aria-hidden="true" />
        </Button>
      </div>
      <div className={styles.row}>
        <LimitEntry
          label={`Low limit of ${name}`}
          value={low}
          onChange={(next) => endsAfter(() => setLimits({ low: next, high }, 'low'), endGesture)}
        />
        <LimitSlider
          name={name}
          source={source}
          low={low}
          high={high}
          onChange={setLimits}
          onEnd={endGesture}
        />
        <LimitEntry
          label={`High limit of ${name}`}
          value={high}
          onChange={(next) => endsAfter(() => setLimits({ low, high: next }, 'high'), endGesture)}
        />
      </div>
      <div className={styles.row}>
        <span className={styles.word}>gamma</span>
        <RangeSlider
          label={`Gamma of ${name}`}
          hands={[`Gamma of ${name}`]}
          values={[handOfGamma(gamma)]}
          from={-2}
          to={2}
          step={0.05}
          onChange={([hand = 0]) => setChannelGamma(workbench, index, gammaOfHand(hand))}
          onEnd={endGesture}
        />
        <output className={styles.number}>{gamma}</output>
      </div>
      <LimitsInWords source={source} low={low} high={high} />
    </li>
  );
});

interface LimitSource extends LimitPair {
  readonly source: string;
}

function LimitsInWords({ source, low, high }: LimitSource): React.JSX.Element | null {
  const map = useSource(source);
  if (map === null) return null;
  const text = formatLimits(limitsOf(map.values, low, high), map.unit);
  return (
    <small className={styles.limits}>
      {text.low} – {text.highWithUnit}
    </small>
  );
}

/** A typed value is a step of its own, never part of a drag. */
function endsAfter(change: () => void, endGesture: () => void): void {
  endGesture();
  change();
  endGesture();
}

/** Colour fields know six digits only. */
function sixDigits(colour: string): string {
  return colour.length === 4 ? `#${colour.slice(1).replace(/./g, '$&$&')}` : colour.toLowerCase();
}

/** The choices, and the channel's own map should it be none of them. */
function withSource(choices: readonly ChoiceItems[], source: string): readonly ChoiceItems[] {
  const isOffered = choices.some(({ items }) => items.some(({ id }) => id === source));
  if (isOffered) return choices;
  return [...choices, { title: 'Other', items: [{ id: source, words: channelLabel(source) }] }];
}
