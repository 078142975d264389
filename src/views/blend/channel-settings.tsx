/** One channel of the blend: its map, colour, limits and gamma. Each change is an edit; a drag is one. */
import { X } from 'lucide-react';
import { Button } from 'react-aria-components';
import type { FullChannel } from '../../recipe/defaults';
import { formatLimits } from '../../science/limit-text';
import { type LimitPair, percentOf } from '../../science/limits';
import { mapByName } from '../../science/map-by-name';
import type { DerivedMap } from '../../science/scan';
import {
  removeChannel,
  setChannelColour,
  setChannelGamma,
  setChannelLimits,
  setChannelSource,
} from '../../state/blend-actions';
import { channelLabel } from '../../state/channel-words';
import type { ChoiceGroup } from '../../state/lead-choices';
import { Choice } from '../forms/choice';
import { LimitEntry } from '../forms/limit-entry';
import { RangeSlider } from '../forms/range-slider';
import { limitsOf } from '../map/map-limits';
import { useResults, useWorkbench } from '../workbench-context';
import styles from './blend-settings.module.css';
import { gammaOfHand, handOfGamma } from './gamma-hand';

interface Props {
  readonly channel: FullChannel;
  readonly index: number;
  readonly groups: readonly ChoiceGroup[];
}

export function ChannelSettings({ channel, index, groups }: Props): React.JSX.Element {
  const workbench = useWorkbench();
  const { source, colour, low, high, gamma } = channel;
  const known = useResults((results) => results.maps);
  const map = mapByName((name) => known.get(name), source);
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
          groups={withSource(groups, source)}
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
          low={low}
          high={high}
          map={map}
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
      {map !== null && <LimitsInWords map={map} low={low} high={high} />}
    </li>
  );
}

interface LimitSliderProps extends LimitPair {
  readonly name: string;
  readonly map: DerivedMap | null;
  readonly onChange: (limits: LimitPair, moved: 'low' | 'high') => void;
  readonly onEnd: () => void;
}

/** Over percentiles where both limits are; else over the map's values, which the limits then become. */
function LimitSlider({ name, map, low, high, onChange, onEnd }: LimitSliderProps) {
  const percents = [percentOf(low), percentOf(high)] as const;
  const [lowPercent, highPercent] = percents;
  const isPercent = lowPercent !== null && highPercent !== null;
  const ends = map === null ? { low: 0, high: 1 } : limitsOf(map.values, 'p0', 'p100');
  const now = map === null ? ends : limitsOf(map.values, low, high);
  const values = isPercent ? [lowPercent, highPercent] : [now.low, now.high];
  const from = isPercent ? 0 : Math.min(ends.low, now.low);
  const to = isPercent ? 100 : Math.max(ends.high, now.high);
  // A map without values, or with one only, has no range to slide over.
  if (!(from < to)) return <span />;
  const step = isPercent ? 0.1 : (to - from) / 1000;
  const written = (value: number): LimitPair['low'] =>
    isPercent ? `p${Number(value.toFixed(1))}` : Number(value.toPrecision(6));
  return (
    <RangeSlider
      label={`Limits of ${name}`}
      hands={[`Low limit of ${name}`, `High limit of ${name}`]}
      values={values}
      from={from}
      to={to}
      step={step}
      onChange={([nextLow = from, nextHigh = to]) => {
        // The hand that was not moved keeps its limit as it was written.
        const isLow = nextLow !== values[0];
        onChange(
          isLow ? { low: written(nextLow), high } : { low, high: written(nextHigh) },
          isLow ? 'low' : 'high',
        );
      }}
      onEnd={onEnd}
    />
  );
}

function LimitsInWords({ map, low, high }: LimitPair & { readonly map: DerivedMap }) {
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
function withSource(groups: readonly ChoiceGroup[], source: string) {
  const items = groups.map(({ title, maps }) => ({
    title,
    items: maps.map(({ name, title: words }) => ({ id: name, words })),
  }));
  const isOffered = items.some((group) => group.items.some(({ id }) => id === source));
  if (isOffered) return items;
  return [...items, { title: 'Other', items: [{ id: source, words: channelLabel(source) }] }];
}
