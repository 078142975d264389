/** One guess of the import sheet: what it is, what else it could be, and why. */
import { useId, useMemo } from 'react';
import type { ScanChoices } from '../../io/scan-choices';
import type { Guess } from '../../io/scan-plan';
import { Choice } from '../forms/choice';
import { alternativeInWords, evidenceInWords, fieldWords } from './guess-words';
import styles from './import-sheet.module.css';

interface Props {
  readonly guess: Guess;
  readonly hasLabel: boolean;
  readonly onState: (stated: ScanChoices) => void;
  /** fields for numbers the user may state */
  readonly children?: React.ReactNode;
}

const asItIs = 'as it is';

export function GuessRow(props: Props): React.JSX.Element {
  const { guess, hasLabel, onState, children } = props;
  const { field, label, source, alternatives } = guess;
  const groups = useMemo(
    () => [
      {
        title: '',
        items: [
          { id: asItIs, words: label },
          ...alternatives.map((other, index) => ({
            id: String(index),
            words: alternativeInWords(other),
          })),
        ],
      },
    ],
    [label, alternatives],
  );
  const why = useId();
  return (
    <fieldset
      aria-label={fieldWords[field]}
      aria-describedby={why}
      className={`${styles.row} ${source === 'missing' ? styles.missing : ''}`}
      data-field={field}
      data-missing={source === 'missing' || undefined}
    >
      <span className={styles.field} aria-hidden="true">
        {fieldWords[field]}
      </span>
      <div className={styles.value}>
        {hasLabel && <span className={styles.plain}>{label}</span>}
        {alternatives.length > 0 && (
          <Choice
            label={fieldWords[field]}
            value={asItIs}
            groups={groups}
            onChange={(id) => {
              const other = alternatives[Number(id)];
              if (other !== undefined) onState(other.choice);
            }}
          />
        )}
        {children}
        <small id={why}>{evidenceInWords(guess)}</small>
      </div>
    </fieldset>
  );
}
