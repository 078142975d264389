/** The files beside the scan: an axis, a height map; and a way to add them. */
import { X } from 'lucide-react';
import { useRef } from 'react';
import { Button } from 'react-aria-components';
import { openFiles } from '../../state/opened-files';
import { removeCompanion } from '../../state/scan-opening';
import type { ImportDraft } from '../../state/session-store';
import { useWorkbench } from '../workbench-context';
import styles from './import-sheet.module.css';

export function CompanionFiles({ draft }: { readonly draft: ImportDraft }): React.JSX.Element {
  const workbench = useWorkbench();
  const input = useRef<HTMLInputElement>(null);
  const { companions } = draft.inputs;
  return (
    <div className={styles.companions}>
      {companions.length > 0 && (
        <ul aria-label="Files beside the scan">
          {companions.map(({ name }) => (
            <li key={name}>
              <span>{name}</span>
              <Button
                className={styles.leaveOut ?? ''}
                aria-label={`Leave out ${name}`}
                onPress={() => removeCompanion(workbench, name)}
              >
                <X size={12} aria-hidden="true" />
              </Button>
            </li>
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
      <Button className={styles.add ?? ''} onPress={() => input.current?.click()}>
        Add a height map or axis file …
      </Button>
    </div>
  );
}
