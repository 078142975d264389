/** The sheet on which a scan is opened: what was guessed, why, and what the user says instead. */
import { useEffect, useRef } from 'react';
import { Button, Dialog, Heading, Modal, ModalOverlay } from 'react-aria-components';
import { scanInWords } from '../../state/cursor-place';
import { acceptImport, cancelImport } from '../../state/scan-opening';
import type { ImportDraft } from '../../state/session-store';
import { useSession, useWorkbench } from '../workbench-context';
import { CompanionFiles } from './companion-files';
import { GuessList } from './guess-list';
import { answerInWords, capitalised, hindranceInWords } from './guess-words';
import styles from './import-sheet.module.css';
import { PreviewView } from './preview-view';
import { shownGuesses } from './shown-guesses';

export function ImportSheet(): React.JSX.Element {
  const workbench = useWorkbench();
  const draft = useSession((session) => session.draft);
  return (
    <ModalOverlay
      className={styles.overlay ?? ''}
      isOpen={draft !== null}
      onOpenChange={(isOpen) => {
        if (!isOpen) cancelImport(workbench);
      }}
    >
      <Modal className={styles.modal ?? ''}>
        <Dialog className={styles.sheet ?? ''}>
          {draft !== null && <Sheet key={draft.inputs.scan.name} draft={draft} />}
        </Dialog>
      </Modal>
    </ModalOverlay>
  );
}

function Sheet({ draft }: { readonly draft: ImportDraft }): React.JSX.Element {
  const workbench = useWorkbench();
  const { inspection, inputs, isLooking, isRevision } = draft;
  const canOpen = inspection !== null && inspection.plan !== null;
  const { guesses, open } = useFocusOfNeed(inspection);
  return (
    <>
      <header className={styles.header}>
        <Heading slot="title">{inputs.scan.name}</Heading>
        <span>{inspection?.format ?? ''}</span>
      </header>
      <div className={styles.body}>
        <div className={styles.side}>
          <PreviewView draft={draft} />
          <CompanionFiles draft={draft} />
        </div>
        <div className={styles.guesses} aria-busy={isLooking} ref={guesses}>
          <Sayings draft={draft} />
          <GuessList draft={draft} />
        </div>
      </div>
      <footer className={styles.footer}>
        <span role="status">{statusOf(draft)}</span>
        <Button className={styles.cancel ?? ''} onPress={() => cancelImport(workbench)}>
          Cancel
        </Button>
        <Button
          className={styles.primary ?? ''}
          ref={open}
          isDisabled={!canOpen}
          onPress={() => void acceptImport(workbench)}
        >
          {isRevision ? 'Read again' : 'Open'}
        </Button>
      </footer>
    </>
  );
}

/**
 * The focus is first on the number that is needed, or else on the button that opens the scan; when
 * something else turns out to be needed, there, unless the user is at another guess.
 */
function useFocusOfNeed(inspection: ImportDraft['inspection']) {
  const guesses = useRef<HTMLDivElement>(null);
  const open = useRef<HTMLButtonElement>(null);
  const isLookedAt = inspection !== null;
  const [need = null] = shownGuesses(inspection).missing;
  useEffect(() => {
    if (isLookedAt) open.current?.focus();
  }, [isLookedAt]);
  useEffect(() => {
    const rows = guesses.current;
    if (need === null || rows === null || rows.contains(document.activeElement)) return;
    rows.querySelector<HTMLElement>(`[data-field=${need}] input[inputmode]`)?.focus();
  }, [need]);
  return { guesses, open };
}

/** What is in the way, and what else the user should know. */
function Sayings({ draft }: { readonly draft: ImportDraft }): React.JSX.Element {
  const { inspection } = draft;
  const answer = answerInWords(shownGuesses(inspection).missing);
  return (
    <>
      {inspection?.problems.map(({ what, hint }) => (
        <p key={what} className={styles.problem} role="alert">
          {capitalised(what)}. <span>{answer === '' ? hint : answer}</span>
        </p>
      ))}
      {inspection?.warnings.map((warning) => (
        <p key={warning} className={styles.warning}>
          {capitalised(warning)}
        </p>
      ))}
    </>
  );
}

function statusOf({ inspection, inputs, isLooking }: ImportDraft): string {
  if (isLooking) return `Looking at ${inputs.scan.name} …`;
  const plan = inspection?.plan ?? null;
  if (plan === null) return hindranceInWords(inspection);
  return scanInWords(plan.meta, plan.resolved.axis?.medium ?? 'air');
}
