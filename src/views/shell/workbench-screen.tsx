/** The whole screen: recipe at left, two panes over the energy axis, values at right. */
import { useState } from 'react';
import { deleteBand } from '../../state/band-actions';
import { stepLeadMap } from '../../state/lead-actions';
import { openFiles } from '../../state/opened-files';
import { togglePinAt } from '../../state/pin-actions';
import { recipeFile } from '../../state/recipe-files';
import { BlendPane } from '../blend/blend-pane';
import { sharedCamera } from '../canvas/shared-camera';
import { DropZone } from '../drop/drop-zone';
import { useFilePicker } from '../drop/use-file-picker';
import { EnergyPanel } from '../energy/energy-panel';
import { ImportSheet } from '../import/import-sheet';
import { KeysSheet } from '../keys/keys-sheet';
import { letGo } from '../keys/let-go';
import { useKeys } from '../keys/use-keys';
import { LeadPane } from '../lead/lead-pane';
import { Notices } from '../notices/notices';
import { RecipeColumn } from '../recipe/recipe-column';
import { ValuesColumn } from '../values/values-column';
import { useSession, useWorkbench } from '../workbench-context';
import { download } from './download';
import { EmptyScreen } from './empty-screen';
import { Footer } from './footer';
import { Header } from './header';
import styles from './workbench-screen.module.css';

export function WorkbenchScreen(): React.JSX.Element {
  const workbench = useWorkbench();
  const { view, recipe, crosshair, session } = workbench;
  const hasScan = useSession((state) => state.scan !== null);
  const [areKeysShown, setKeysShown] = useState(false);
  const open = useFilePicker((files) => void openFiles(workbench, files));
  const actions = {
    open,
    save: () => {
      if (session.getState().scan !== null) download(recipeFile(workbench));
    },
    undo: recipe.undo,
    redo: recipe.redo,
    pin: () => {
      const pixel = crosshair.get();
      if (pixel !== null) togglePinAt(workbench, pixel);
    },
    deleteBand: () => {
      const { selection } = view.getState();
      if (selection.kind === 'band') deleteBand(workbench, selection.name);
    },
    previousLeadMap: () => stepLeadMap(workbench, -1),
    nextLeadMap: () => stepLeadMap(workbench, 1),
    fitMaps: () => sharedCamera.fit(),
    logCounts: () => view.setState(({ logCounts }) => ({ logCounts: !logCounts })),
    wholeAxis: () => view.setState({ energyRange: null }),
    theme: () => view.setState(({ theme }) => ({ theme: theme === 'dark' ? 'light' : 'dark' })),
    letGo: () => letGo(workbench),
    keys: () => setKeysShown(true),
  };
  useKeys(actions);
  return (
    <div className={styles.screen}>
      <Header onOpen={open} onSave={actions.save} onTheme={actions.theme} onKeys={actions.keys} />
      <RecipeColumn />
      <main className={styles.main}>
        {hasScan ? (
          <div className={styles.panes}>
            <LeadPane />
            <BlendPane />
          </div>
        ) : (
          <EmptyScreen onOpen={open} />
        )}
        <EnergyPanel />
      </main>
      <ValuesColumn />
      <Footer />
      <ImportSheet />
      <Notices />
      <KeysSheet isOpen={areKeysShown} onClose={() => setKeysShown(false)} />
      <DropZone onFiles={(files) => void openFiles(workbench, files)} />
    </div>
  );
}
