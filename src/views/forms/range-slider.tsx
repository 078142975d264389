/** A slider with one hand, its bar drawn from zero, or with two for a range. */
import { Slider, SliderFill, SliderThumb, SliderTrack } from 'react-aria-components';
import styles from './range-slider.module.css';

interface Props {
  readonly label: string;
  /** name of each hand; as many as values */
  readonly hands: readonly string[];
  readonly values: readonly number[];
  readonly from: number;
  readonly to: number;
  readonly step: number;
  readonly onChange: (values: readonly number[]) => void;
  /** the hand let go: the drag is one step of the history */
  readonly onEnd: () => void;
}

export function RangeSlider(props: Props): React.JSX.Element {
  const { label, hands, values, from, to, step, onChange, onEnd } = props;
  return (
    <Slider
      className={styles.slider ?? ''}
      aria-label={label}
      value={[...values]}
      minValue={from}
      maxValue={to}
      step={step}
      onChange={onChange}
      onChangeEnd={onEnd}
    >
      <SliderTrack className={styles.track ?? ''}>
        <SliderFill className={styles.fill ?? ''} />
        {hands.map((hand, index) => (
          <SliderThumb key={hand} index={index} aria-label={hand} className={styles.hand ?? ''} />
        ))}
      </SliderTrack>
    </Slider>
  );
}
