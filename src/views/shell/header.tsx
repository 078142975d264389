/** Top line: which scan this is, and what can be done with the document. */
import { CircleHelp, FolderOpen, Moon, Redo2, Save, Sun, Undo2 } from 'lucide-react';
import { Button } from 'react-aria-components';
import { useStore } from 'zustand';
import { scanInWords } from '../../state/cursor-place';
import { useRecipe, useSession, useView, useWorkbench } from '../workbench-context';
import styles from './header.module.css';

export interface HeaderActions {
  readonly onOpen: () => void;
  readonly onSave: () => void;
  readonly onTheme: () => void;
  readonly onKeys: () => void;
}

export function Header({ onOpen, onSave, onTheme, onKeys }: HeaderActions): React.JSX.Element {
  const { recipe } = useWorkbench();
  const scan = useSession((session) => session.scan);
  const theme = useView((view) => view.theme);
  const medium = useRecipe((document) => document.scan?.axis?.medium ?? 'air');
  const lastDone = useStore(recipe, ({ past }) => past.at(-1)?.label ?? null);
  const nextDone = useStore(recipe, ({ future }) => future[0]?.label ?? null);
  const meta = scan?.open.plan.meta ?? null;
  return (
    <header className={styles.header}>
      <h1 className={styles.word}>
        <span>Rim</span>light
      </h1>
      <p className={styles.scan} data-testid="scan-line">
        {meta === null ? (
          'no scan open'
        ) : (
          <>
            <b title={meta.name}>{meta.name}</b> · {scanInWords(meta, medium)}
          </>
        )}
      </p>
      <span className={styles.grow} />
      <Button
        className={styles.quiet}
        isDisabled={lastDone === null}
        onPress={recipe.undo}
        aria-label={lastDone === null ? 'Undo' : `Undo: ${lastDone}`}
      >
        <Undo2 size={15} aria-hidden="true" />
        <span className={styles.words}>Undo</span>
      </Button>
      <Button
        className={styles.quiet}
        isDisabled={nextDone === null}
        onPress={recipe.redo}
        aria-label={nextDone === null ? 'Redo' : `Redo: ${nextDone}`}
      >
        <Redo2 size={15} aria-hidden="true" />
        <span className={styles.words}>Redo</span>
      </Button>
      <Button
        className={styles.quiet}
        onPress={onTheme}
        aria-label={`Switch to ${theme === 'dark' ? 'light' : 'dark'} colours`}
      >
        {theme === 'dark' ? (
          <Sun size={15} aria-hidden="true" />
        ) : (
          <Moon size={15} aria-hidden="true" />
        )}
      </Button>
      <Button className={styles.quiet} onPress={onKeys} aria-label="Keys">
        <CircleHelp size={15} aria-hidden="true" />
      </Button>
      <Button
        className={styles.button}
        onPress={onSave}
        isDisabled={scan === null}
        aria-label="Save recipe"
      >
        <Save size={15} aria-hidden="true" />
        <span className={styles.words}>Save recipe</span>
      </Button>
      <Button className={styles.primary} onPress={onOpen} aria-label="Open scan or recipe">
        <FolderOpen size={15} aria-hidden="true" />
        Open
      </Button>
    </header>
  );
}
