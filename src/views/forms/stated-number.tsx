/** A number the user states: taken over on Enter, as the field is left, or once the typing pauses. */
import { useEffect, useRef, useState } from 'react';
import { Input, Label, TextField } from 'react-aria-components';
import { enteredNumber, type NumberRule, numberRuleInWords } from './entered-number';
import styles from './stated-number.module.css';

interface Props {
  /** for a screen reader; on screen, too, with `isLabelShown` */
  readonly label: string;
  readonly isLabelShown?: boolean;
  /** null while it is not known */
  readonly value: number | null;
  readonly rule: NumberRule;
  readonly onState: (value: number) => void;
  /** the field was emptied; without it the value comes back */
  readonly onClear?: () => void;
}

const pauseMs = 700;

export function StatedNumber(props: Props): React.JSX.Element {
  const { label, isLabelShown = false, value, rule } = props;
  const [text, setText] = useState(textOf(value));
  const entered = enteredNumber(text, rule);
  const latest = useRef(props);
  useEffect(() => {
    latest.current = props;
  });
  // A value that comes from elsewhere is shown; one's own is left as typed ("785." on the way to 785.3).
  useEffect(() => {
    setText((typed) => (enteredNumber(typed, rule) === value ? typed : textOf(value)));
  }, [value, rule]);
  useEffect(() => {
    if (entered === null || entered === value) return;
    const timer = setTimeout(() => latest.current.onState(entered), pauseMs);
    return () => clearTimeout(timer);
  }, [entered, value]);
  const take = (): void => {
    const { onClear } = latest.current;
    if (text.trim() === '' && value !== null && onClear !== undefined) onClear();
    else if (entered === null) setText(textOf(value));
    else if (entered !== value) latest.current.onState(entered);
  };
  return (
    <TextField
      className={styles.number ?? ''}
      {...(isLabelShown ? {} : { 'aria-label': label })}
      value={text}
      isInvalid={text.trim() !== '' && entered === null}
      onChange={setText}
      onBlur={take}
      onKeyDown={(event) => {
        if (event.key === 'Enter') take();
        // Esc closes the sheet from here, too.
        event.continuePropagation();
      }}
    >
      {isLabelShown && <Label>{label}</Label>}
      <Input inputMode="decimal" autoComplete="off" title={numberRuleInWords(rule)} />
    </TextField>
  );
}

function textOf(value: number | null): string {
  return value === null || Number.isNaN(value) ? '' : String(value);
}
