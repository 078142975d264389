/** All guesses of the import sheet, what is needed first. */
import { useState } from 'react';
import type { ScanChoices } from '../../io/scan-choices';
import type { GuessField } from '../../io/scan-plan';
import { stateChoices } from '../../state/scan-opening';
import type { ImportDraft } from '../../state/session-store';
import { useWorkbench } from '../workbench-context';
import { AxisEntry } from './axis-entry';
import { controlsOf, type NumberFields } from './guess-controls';
import { GuessRow } from './guess-row';
import { shownGuesses } from './shown-guesses';
import { DetectorEntry, ExposureEntry, LaserEntry, PitchEntry } from './stated-numbers';

export function GuessList({ draft }: { readonly draft: ImportDraft }): React.JSX.Element {
  const workbench = useWorkbench();
  const { inspection, choices } = draft;
  const plan = inspection?.plan ?? null;
  // A row that was asked for stays where it was answered.
  const [asked, setAsked] = useState<readonly GuessField[]>([]);
  const { guesses, missing } = shownGuesses(inspection, asked);
  if (missing.some((field) => !asked.includes(field))) {
    setAsked([...new Set([...asked, ...missing])]);
  }
  // What was found stands in the fields, so that a small correction is a small one.
  const known: ScanChoices = { ...plan?.resolved, ...choices };
  const onState = (stated: ScanChoices): void => stateChoices(workbench, stated);
  const entriesOf = (fields: NumberFields): React.JSX.Element => {
    const given = { stated: choices, known, onState };
    switch (fields) {
      case 'laser':
        return <LaserEntry {...given} />;
      case 'pixel':
        return <PitchEntry {...given} shape={plan?.meta.shape ?? null} />;
      case 'exposure':
        return <ExposureEntry {...given} />;
      case 'axis':
        return <AxisEntry {...given} />;
      case 'detector':
        return <DetectorEntry {...given} />;
    }
  };
  return (
    <>
      {guesses.map((guess) => {
        const { numbers, hasLabel } = controlsOf(guess, known);
        return (
          <GuessRow key={guess.field} guess={guess} hasLabel={hasLabel} onState={onState}>
            {numbers !== null && entriesOf(numbers)}
          </GuessRow>
        );
      })}
    </>
  );
}
