/** The page's entry: engine, stores, screen; then the first scan. */
import '@fontsource/ibm-plex-sans/latin-400.css';
import '@fontsource/ibm-plex-sans/latin-500.css';
import '@fontsource/ibm-plex-sans/latin-600.css';
import '@fontsource/ibm-plex-mono/latin-400.css';
import '@fontsource/ibm-plex-mono/latin-600.css';
import './tokens.css';
import { createRoot } from 'react-dom/client';
import { createBrowserEngine } from '../../workers/browser-engine';
import { startAutosave } from '../state/autosave';
import { offerEarlierRecipe } from '../state/earlier-recipe';
import { createWorkbench } from '../state/workbench';
import { loadPlotLibrary } from '../views/energy/plotting-library';
import { App } from './app';
import { browserStorage } from './browser-storage';
import { openFirstScan } from './first-scan';
import { recallView, rememberView } from './view-memory';

const workbench = createWorkbench(createBrowserEngine(), recallView());
rememberView(workbench.view);
const root = document.getElementById('root');
if (root === null) throw new Error('the page has no root element');
createRoot(root).render(<App workbench={workbench} />);

openFirstScan(workbench, browserStorage)
  .catch(workbench.notices.sayError)
  .finally(() => {
    offerEarlierRecipe(workbench, browserStorage);
    startAutosave(workbench, browserStorage, () => new Date());
  });
requestAnimationFrame(() => void loadPlotLibrary());
