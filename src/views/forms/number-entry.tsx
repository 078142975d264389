/** A labelled number that can be typed or stepped; it is taken over when the field is left or Enter is pressed. */
import { Group, Input, Label, NumberField } from 'react-aria-components';
import styles from './number-entry.module.css';

interface Props {
  readonly label: string;
  readonly value: number;
  readonly step: number;
  readonly onChange: (value: number) => void;
}

export function NumberEntry({ label, value, step, onChange }: Props): React.JSX.Element {
  return (
    <NumberField
      className={styles.field ?? ''}
      value={value}
      formatOptions={{ maximumFractionDigits: 6, useGrouping: false }}
      onChange={(next) => {
        if (Number.isFinite(next) && next !== value) onChange(next);
      }}
      onKeyDown={(event) => {
        const sign = event.key === 'ArrowUp' ? 1 : event.key === 'ArrowDown' ? -1 : 0;
        if (sign === 0) return;
        event.preventDefault();
        onChange(Number((value + sign * step).toFixed(6)));
      }}
    >
      <Label>{label}</Label>
      <Group>
        <Input />
      </Group>
    </NumberField>
  );
}
