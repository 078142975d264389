/** The root of the page: the workbench, and a sentence instead of a blank page should a view break. */
import { useEffect } from 'react';
import type { Workbench } from '../state/workbench';
import { WorkbenchScreen } from '../views/shell/workbench-screen';
import { useView, WorkbenchContext } from '../views/workbench-context';
import { Mishap } from './mishap';

export function App({ workbench }: { readonly workbench: Workbench }): React.JSX.Element {
  return (
    <Mishap>
      <WorkbenchContext value={workbench}>
        <ThemeOfPage />
        <WorkbenchScreen />
      </WorkbenchContext>
    </Mishap>
  );
}

function ThemeOfPage(): null {
  const theme = useView((view) => view.theme);
  useEffect(() => {
    document.documentElement.dataset.theme = theme;
  }, [theme]);
  return null;
}
