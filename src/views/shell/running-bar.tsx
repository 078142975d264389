/** A long run in the footer: what it is, how far, how long still, and a way to stop it. */
import { useEffect, useState } from 'react';
import { Button, ProgressBar } from 'react-aria-components';
import { useSession } from '../workbench-context';
import styles from './running-bar.module.css';
import { timeLeft } from './time-left';

/** What is over by then never shows. */
const appearsAfterMs = 300;

export function RunningBar(): React.JSX.Element | null {
  const running = useSession((session) => session.running);
  const startedMs = running?.startedMs ?? null;
  const [shownFor, setShownFor] = useState<number | null>(null);
  useEffect(() => {
    if (startedMs === null) return;
    const timer = setTimeout(() => setShownFor(startedMs), appearsAfterMs);
    return () => clearTimeout(timer);
  }, [startedMs]);
  if (running === null || shownFor !== startedMs) return null;
  const { label, share, stop } = running;
  return (
    <>
      <ProgressBar className={styles.progress ?? ''} value={100 * share} aria-label={label}>
        {({ percentage, valueText }) => (
          <>
            <span>{label}</span>
            <i className={styles.track}>
              <i style={{ width: `${percentage ?? 0}%` }} />
            </i>
            <span>{valueText}</span>
            <span>{timeLeft(share, performance.now() - running.startedMs)}</span>
          </>
        )}
      </ProgressBar>
      <Button className={styles.stop ?? ''} onPress={stop}>
        Stop
      </Button>
    </>
  );
}
