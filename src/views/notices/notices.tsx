/** Short messages at the lower left: what was done, what went wrong, at most one thing to do. */
import { X } from 'lucide-react';
import { useEffect, useRef } from 'react';
import { Button } from 'react-aria-components';
import { useStore } from 'zustand';
import type { Notice } from '../../state/notices';
import { useWorkbench } from '../workbench-context';
import styles from './notices.module.css';

export function Notices(): React.JSX.Element {
  const { notices } = useWorkbench();
  const shown = useStore(notices, (state) => state.notices);
  return (
    <section className={styles.notices} aria-label="Messages" aria-live="polite">
      {shown.map((notice) => (
        <OneNotice key={notice.id} notice={notice} onDismiss={() => notices.dismiss(notice.id)} />
      ))}
    </section>
  );
}

/** What was done needs no answer and goes by itself. */
const doneStaysMs = 8000;

interface Props {
  readonly notice: Notice;
  readonly onDismiss: () => void;
}

function OneNotice({ notice, onDismiss }: Props): React.JSX.Element {
  const { id, tone, text, hint, action } = notice;
  const { notices } = useWorkbench();
  const box = useRef<HTMLDivElement>(null);
  useEffect(() => {
    if (tone !== 'done') return;
    const timer = setInterval(() => {
      // Not while it is pointed at or holds the focus.
      if (box.current?.matches(':hover, :focus-within') !== true) notices.dismiss(id);
    }, doneStaysMs);
    return () => clearInterval(timer);
  }, [tone, notices, id]);
  return (
    <div
      className={`${styles.notice} ${styles[tone]}`}
      role={tone === 'error' ? 'alert' : 'status'}
      ref={box}
    >
      <p>
        {text}
        {hint !== '' && <span> {hint}</span>}
      </p>
      {action !== null && (
        <Button
          className={styles.action ?? ''}
          onPress={() => {
            action.run();
            onDismiss();
          }}
        >
          {action.label}
        </Button>
      )}
      <Button className={styles.dismiss ?? ''} aria-label="Dismiss" onPress={onDismiss}>
        <X size={13} aria-hidden="true" />
      </Button>
    </div>
  );
}
