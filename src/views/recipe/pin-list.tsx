/** The pins, lettered, with their labels; each can be named or let go. */
import { X } from 'lucide-react';
import { Button, Input, TextField } from 'react-aria-components';
import { labelPinAs, removePin } from '../../state/pin-actions';
import { pinColour } from '../map/pin-styles';
import side from '../shell/side-column.module.css';
import { useRecipe, useView, useWorkbench } from '../workbench-context';
import styles from './recipe-column.module.css';

export function PinList(): React.JSX.Element {
  const workbench = useWorkbench();
  const theme = useView((view) => view.theme);
  const pins = useRecipe((document) => document.pins) ?? [];
  return (
    <section aria-label="Pins">
      <h2 className={side.heading}>
        Pins <span>{pins.length === 0 ? '' : pins.length}</span>
      </h2>
      {pins.length === 0 && <p className={side.hint}>Click a map to pin a pixel.</p>}
      <ul className={styles.pins}>
        {pins.map(({ name, x, y, label }) => (
          <li
            key={name}
            className={styles.pin}
            onPointerEnter={() => workbench.crosshair.set({ y, x })}
            onPointerLeave={() => workbench.crosshair.set(null)}
          >
            <b style={{ color: pinColour(name, theme) }}>{name}</b>
            <TextField
              className={styles.pinLabel ?? ''}
              aria-label={`Label of pin ${name}`}
              key={label ?? ''}
              defaultValue={label ?? ''}
              onBlur={(event) => {
                const text = (event.target as HTMLInputElement).value.trim();
                if (text !== (label ?? '')) labelPinAs(workbench, name, text);
              }}
              onKeyDown={(event) => {
                if (event.key === 'Enter') (event.target as HTMLInputElement).blur();
              }}
            >
              <Input placeholder={`pixel ${x}, ${y}`} />
            </TextField>
            <small>
              {x}, {y}
            </small>
            <Button
              className={styles.letGo}
              aria-label={`Let go of pin ${name}`}
              onPress={() => removePin(workbench, name)}
            >
              <X size={12} aria-hidden="true" />
            </Button>
          </li>
        ))}
      </ul>
    </section>
  );
}
