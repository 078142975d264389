/** Right column: what is known of the pixel under the crosshair, then the settings of what is selected. */
import type { Selection } from '../../state/view-store';
import { BandSettings } from '../band/band-settings';
import { BlendSettings } from '../blend/blend-settings';
import { ComponentSettings } from '../model/component-settings';
import { ModelSettings } from '../model/model-settings';
import side from '../shell/side-column.module.css';
import { useView } from '../workbench-context';
import { PixelValues } from './pixel-values';
import styles from './values-column.module.css';

export function ValuesColumn(): React.JSX.Element {
  const selection = useView((view) => view.selection);
  return (
    <aside className={`${side.column} ${styles.column}`} aria-label="Values and settings">
      <PixelValues />
      <Settings selection={selection} />
    </aside>
  );
}

function Settings({ selection }: { readonly selection: Selection }): React.JSX.Element {
  switch (selection.kind) {
    case 'band':
      return <BandSettings name={selection.name} />;
    case 'model':
      return <ModelSettings />;
    case 'component':
      return <ComponentSettings name={selection.name} />;
    default:
      return <BlendSettings />;
  }
}
