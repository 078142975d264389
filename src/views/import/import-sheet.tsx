/** The sheet on which a scan is opened: what was guessed, why, and what the user says instead. */
import { useRef } from 'react';
import { Button, Dialog, Heading, Modal, ModalOverlay } from 'react-aria-components';
import type { ScanChoices } from '../../io/scan-choices';
import type { Guess } from '../../io/scan-plan';
import { openFiles } from '../../state/opened-files';
import { acceptImport, cancelImport, stateChoices } from '../../state/scan-opening';
import type { ImportDraft } from '../../state/session-store';
import { useSession, useWorkbench } from '../workbench-context';
import { GuessRow } from './guess-row';
import styles from './import-sheet.module.css';
import { PreviewView } from './preview-view';
import { AxisEntry, DetectorEntry, ExposureEntry, LaserEntry, PitchEntry } from './stated-numbers';

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
        <Dialog className={styles.sheet ?? ''}>{draft !== null && <Sheet draft={draft} />}</Dialog>
      </Modal>
    </ModalOverlay>
  );
}

function Sheet({ draft }: { readonly draft: ImportDraft }): React.JSX.Element {
  const workbench = useWorkbench();
  const { inspection, preview, inputs, isRevision } = draft;
  const plan = inspection?.plan ?? null;
  // What does not apply to this scan (a pitch of one spectrum) is no question.
  const guesses = inspection?.guesses.filter(({ label }) => label !== '–') ?? [];
  const isAsked = guesses.some(({ source }) => source === 'missing');
  const onState = (stated: ScanChoices): void => stateChoices(workbench, stated);
  return (
    <>
      <header className={styles.header}>
        <Heading slot="title">{inputs.scan.name}</Heading>
        <span>{inspection === null ? 'looking …' : inspection.format}</span>
      </header>
      <div className={styles.body}>
        <div className={styles.side}>
          <PreviewView preview={preview} plan={plan} />
          <CompanionFiles draft={draft} />
        </div>
        <div className={styles.guesses} aria-busy={inspection === null}>
          {inspection?.problems.map(({ what, hint }) => (
            <p key={what} className={styles.problem} role="alert">
              {capitalised(what)}. <span>{isAsked ? 'State it below.' : hint}</span>
            </p>
          ))}
          {inspection?.warnings.map((warning) => (
            <p key={warning} className={styles.warning}>
              {capitalised(warning)}
            </p>
          ))}
          {guesses.map((guess) => (
            <GuessRow key={guess.field} guess={guess} onState={onState}>
              {numbersOf(guess, draft, onState)}
            </GuessRow>
          ))}
        </div>
      </div>
      <footer className={styles.footer}>
        <span>
          {plan === null && inspection !== null ? 'It can be opened once the above is stated.' : ''}
        </span>
        <Button onPress={() => cancelImport(workbench)}>Cancel</Button>
        <Button
          className={styles.primary ?? ''}
          autoFocus
          isDisabled={plan === null}
          onPress={() => void acceptImport(workbench)}
        >
          {isRevision ? 'Read again' : 'Open'}
        </Button>
      </footer>
    </>
  );
}

function numbersOf(
  guess: Guess,
  draft: ImportDraft,
  onState: (stated: ScanChoices) => void,
): React.JSX.Element | undefined {
  // What was found stands in the fields, so that a small correction is a small one.
  const choices = { ...draft.inspection?.plan?.resolved, ...draft.choices };
  switch (guess.field) {
    case 'laser':
      return <LaserEntry choices={choices} onState={onState} />;
    case 'pixel':
      return <PitchEntry choices={choices} onState={onState} />;
    case 'exposure':
      return <ExposureEntry choices={choices} onState={onState} />;
    case 'axis':
      return guess.source === 'missing' ? (
        <AxisEntry choices={choices} onState={onState} />
      ) : undefined;
    case 'noise':
      return draft.choices.detector === undefined ? undefined : (
        <DetectorEntry detector={draft.choices.detector} onState={onState} />
      );
    default:
      return undefined;
  }
}

function CompanionFiles({ draft }: { readonly draft: ImportDraft }): React.JSX.Element {
  const workbench = useWorkbench();
  const input = useRef<HTMLInputElement>(null);
  const { companions } = draft.inputs;
  return (
    <div className={styles.companions}>
      {companions.length > 0 && (
        <ul aria-label="Files beside the scan">
          {companions.map(({ name }) => (
            <li key={name}>{name}</li>
          ))}
        </ul>
      )}
      <input
        ref={input}
        type="file"
        multiple
        hidden
        data-testid="companion-input"
        onChange={(event) => {
          const files = [...(event.target.files ?? [])];
          event.target.value = '';
          if (files.length > 0) void openFiles(workbench, files);
        }}
      />
      <Button onPress={() => input.current?.click()}>Add a height map or an axis …</Button>
    </div>
  );
}

function capitalised(text: string): string {
  return text.replace(/^./, (first) => first.toUpperCase());
}
