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
  // Where the focus was before it came here: it goes back, or Esc would no longer reach an open sheet.
  const cameFrom = useRef<HTMLElement | null>(null);
  const dismiss = (id: number): void => {
    notices.dismiss(id);
    if (cameFrom.current?.isConnected === true) cameFrom.current.focus();
    cameFrom.current = null;
  };
  return (
    // Heard and within reach also while a sheet is open: its library hides everything else of the page.
    <section
      className={styles.notices}
      aria-label="Messages"
      aria-live="polite"
      data-react-aria-top-layer="true"
      onFocus={({ currentTarget, relatedTarget }) => {
        if (currentTarget.contains(relatedTarget)) return;
        cameFrom.current = relatedTarget instanceof HTMLElement ? relatedTarget : null;
      }}
    >
      {shown.map((notice) => (
        <OneNotice key={notice.id} notice={notice} onDismiss={() => dismiss(notice.id)} />
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
        {hint === '' ? text : asSentence(text)}
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

/** What is followed by a hint ends before it. */
function asSentence(text: string): string {
  return /[.!?…]$/.test(text) ? text : `${text}.`;
}
