/** One step of the recipe: its name, what it did in one line, and a switch where it has one. */
import { Switch } from 'react-aria-components';
import styles from './recipe-column.module.css';

interface Props {
  readonly title: string;
  readonly detail: string;
  /** `now`: its settings are shown; `refused`: it cannot be run */
  readonly state: 'done' | 'off' | 'now' | 'refused';
  /** null where there is nothing to show or set */
  readonly onPress: (() => void) | null;
  readonly pressLabel: string;
  readonly onSwitch?: () => void;
  readonly children?: React.ReactNode;
}

export function StepCard(props: Props): React.JSX.Element {
  const { title, detail, state, onPress, pressLabel, onSwitch, children } = props;
  return (
    <li className={`${styles.step} ${styles[state]}`}>
      <i className={styles.dot} aria-hidden="true" />
      <div className={styles.body}>
        {onPress === null ? (
          <b>{title}</b>
        ) : (
          <button type="button" className={styles.title} onClick={onPress} aria-label={pressLabel}>
            {title}
          </button>
        )}
        <small>{detail}</small>
        {children}
      </div>
      {onSwitch !== undefined && (
        <Switch
          className={styles.switch ?? ''}
          isSelected={state !== 'off'}
          onChange={onSwitch}
          aria-label={`Use ${title}`}
        >
          <i className={styles.track} aria-hidden="true" />
        </Switch>
      )}
    </li>
  );
}
