/** Both limits of a channel on one slider: over percentiles where both are, else over the map's values. */
import { type LimitPair, percentOf } from '../../science/limits';
import { RangeSlider } from '../forms/range-slider';
import { limitsOf } from '../map/map-limits';
import { useSource } from './use-source';

interface Props extends LimitPair {
  /** of the channel, for a screen reader */
  readonly name: string;
  readonly source: string;
  readonly onChange: (limits: LimitPair, moved: 'low' | 'high') => void;
  readonly onEnd: () => void;
}

export function LimitSlider(props: Props): React.JSX.Element {
  const lowPercent = percentOf(props.low);
  const highPercent = percentOf(props.high);
  if (lowPercent === null || highPercent === null) return <ValueSlider {...props} />;
  return (
    <PairSlider
      {...props}
      values={[lowPercent, highPercent]}
      range={{ from: 0, to: 100, step: 0.1 }}
      written={(value) => `p${Number(value.toFixed(1))}`}
    />
  );
}

/** Over the values of the map; the hand that moves turns its limit into a number. */
function ValueSlider(props: Props): React.JSX.Element {
  const map = useSource(props.source);
  if (map === null) return <span />;
  const ends = limitsOf(map.values, 'p0', 'p100');
  const now = limitsOf(map.values, props.low, props.high);
  const from = Math.min(ends.low, now.low);
  const to = Math.max(ends.high, now.high);
  // A map without values, or with one only, has no range to slide over.
  if (!(from < to)) return <span />;
  return (
    <PairSlider
      {...props}
      values={[now.low, now.high]}
      range={{ from, to, step: (to - from) / 1000 }}
      written={(value) => Number(value.toPrecision(6))}
    />
  );
}

interface PairProps extends Props {
  readonly values: readonly [low: number, high: number];
  readonly range: { readonly from: number; readonly to: number; readonly step: number };
  readonly written: (value: number) => LimitPair['low'];
}

function PairSlider({ name, low, high, values, range, written, onChange, onEnd }: PairProps) {
  return (
    <RangeSlider
      label={`Limits of ${name}`}
      hands={[`Low limit of ${name}`, `High limit of ${name}`]}
      values={values}
      from={range.from}
      to={range.to}
      step={range.step}
      onChange={([nextLow = range.from, nextHigh = range.to]) => {
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
