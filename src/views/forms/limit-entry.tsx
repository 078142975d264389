/** A limit of a colour scale as text: a percentile such as "p2", or a number in the map's unit. */
import { useEffect, useState } from 'react';
import { Input, TextField } from 'react-aria-components';
import { type LimitSpec, parseLimit } from '../../science/limits';
import styles from './limit-entry.module.css';

interface Props {
  readonly label: string;
  readonly value: LimitSpec;
  readonly onChange: (limit: LimitSpec) => void;
}

export function LimitEntry({ label, value, onChange }: Props): React.JSX.Element {
  const [text, setText] = useState(String(value));
  useEffect(() => setText(String(value)), [value]);
  const typed = parseLimit(text);
  const take = (): void => {
    if (typed !== null && typed !== value) onChange(typed);
    // What was not taken is shown no longer; what was comes back as the value.
    setText(String(value));
  };
  return (
    <TextField
      className={styles.entry ?? ''}
      aria-label={label}
      value={text}
      isInvalid={typed === null}
      onChange={setText}
      onBlur={take}
      onKeyDown={(event) => {
        if (event.key === 'Enter') take();
        if (event.key === 'Escape') setText(String(value));
      }}
    >
      <Input title={'A percentile such as p2, or a number'} />
    </TextField>
  );
}
