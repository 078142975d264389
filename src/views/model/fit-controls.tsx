/** Starts the fit of all pixels, and says how it went. */
import { useMemo } from 'react';
import { Button } from 'react-aria-components';
import { useStore } from 'zustand';
import { fitKey, runFit } from '../../state/fit-actions';
import { useRecipe, useResults, useSession, useWorkbench } from '../workbench-context';
import { statusesInWords } from './fit-words';
import styles from './model-settings.module.css';

export function FitControls(): React.JSX.Element {
  const workbench = useWorkbench();
  const recipe = useRecipe((document) => document);
  const scanNumber = useSession((session) => session.scanNumber);
  const isReady = useSession(({ scan, running }) => scan !== null && running === null);
  const status = useResults((results) => results.maps.get('fit.status') ?? null);
  const { madeOf, isRunning, scanFit } = useStore(workbench.fit);
  const words = useMemo(() => (status === null ? [] : statusesInWords(status.values)), [status]);
  const isStale = madeOf !== null && madeOf !== fitKey(scanNumber, recipe);
  const canGoOn = madeOf !== null && !isStale && scanFit?.isWhole === false;
  const isDone = madeOf !== null && !isStale && scanFit?.isWhole === true;
  return (
    <div className={styles.fit}>
      <Button
        className={styles.run ?? ''}
        isDisabled={!isReady || isDone}
        onPress={() => void runFit(workbench)}
      >
        {isRunning
          ? 'Fitting …'
          : canGoOn
            ? 'Go on fitting'
            : isDone
              ? 'All pixels fitted'
              : 'Fit all pixels'}
      </Button>
      {words.map((line) => (
        <p key={line}>{line}</p>
      ))}
      {!isRunning && isStale && <p>The model has changed since: these maps are of the old one.</p>}
      {!isRunning && canGoOn && <p>Stopped: the other pixels have no value yet.</p>}
    </div>
  );
}
