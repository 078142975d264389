/** Right column: what is known of the pixel under the crosshair, then the settings of what is selected. */
import { BandSettings } from '../band/band-settings';
import { BlendSettings } from '../blend/blend-settings';
import side from '../shell/side-column.module.css';
import { useView } from '../workbench-context';
import { PixelValues } from './pixel-values';
import styles from './values-column.module.css';

export function ValuesColumn(): React.JSX.Element {
  const selection = useView((view) => view.selection);
  return (
    <aside className={`${side.column} ${styles.column}`} aria-label="Values and settings">
      <PixelValues />
      {selection.kind === 'band' ? <BandSettings name={selection.name} /> : <BlendSettings />}
    </aside>
  );
}
