/** Settings of the peak model: its window, its noise, its components. */
import { Plus } from 'lucide-react';
import { Button } from 'react-aria-components';
import type { PeakModel } from '../../recipe/schema';
import { componentColours } from '../../state/component-colours';
import { addFloor, selectComponent, setNoise, setWindow } from '../../state/model-actions';
import { suggestPeaks } from '../../state/suggest-peaks';
import { Choice } from '../forms/choice';
import { StatedNumber } from '../forms/stated-number';
import side from '../shell/side-column.module.css';
import { useRecipe, useSession, useView, useWorkbench } from '../workbench-context';
import { FitControls } from './fit-controls';
import styles from './model-settings.module.css';
import { noiseGroups } from './model-words';

export function ModelSettings(): React.JSX.Element {
  const workbench = useWorkbench();
  const recipe = useRecipe((document) => document);
  const axis = useSession(({ scan }) => scan?.open.plan.meta.axis ?? null);
  const isAddingPeak = useView((view) => view.isAddingPeak);
  const { model } = recipe;
  const colours = componentColours(recipe);
  const whole: readonly [number, number] =
    axis === null ? [0, 0] : [axis.edgesEv[0] ?? 0, axis.edgesEv[axis.edgesEv.length - 1] ?? 0];
  const [from, to] = model?.window ?? whole;
  const setEnds = (low: number, high: number): void => {
    if (low !== high) setWindow(workbench, [Math.min(low, high), Math.max(low, high)]);
  };
  return (
    <section className={styles.section} aria-label="Settings of the peak model">
      <h2 className={side.heading}>Peak model</h2>
      {model === undefined ? (
        <p className={side.hint}>
          No model yet. Let one be suggested from the scan, or add a peak and click on the spectrum
          where it is.
        </p>
      ) : (
        <>
          <FitControls />
          <div className={styles.ends}>
            <StatedNumber
              label="from, eV"
              isLabelShown
              value={round(from)}
              rule="positive"
              onState={(low) => setEnds(low, to)}
            />
            <StatedNumber
              label="to, eV"
              isLabelShown
              value={round(to)}
              rule="positive"
              onState={(high) => setEnds(from, high)}
            />
          </div>
          <div className={styles.field}>
            <span>noise</span>
            <Choice
              label="Noise of the fit"
              value={model.noise ?? 'usual'}
              groups={noiseGroups}
              onChange={(noise) =>
                setNoise(workbench, noise === 'usual' ? null : (noise as PeakModel['noise']))
              }
            />
          </div>
          <ul className={styles.components}>
            {model.components.map(({ name, shape, role, optional }) => (
              <li key={name}>
                <button type="button" onClick={() => selectComponent(workbench, name)}>
                  <i style={{ background: colours.get(name) }} />
                  <b>{name}</b>
                  <small>
                    {[
                      role === 'raman' ? 'Raman line' : role,
                      shape,
                      optional ? 'if needed' : undefined,
                    ]
                      .filter((word) => word !== undefined)
                      .join(', ')}
                  </small>
                </button>
              </li>
            ))}
          </ul>
        </>
      )}
      <div className={styles.actions}>
        <Button
          className={styles.add ?? ''}
          aria-pressed={isAddingPeak}
          onPress={() => workbench.view.setState({ isAddingPeak: !isAddingPeak })}
        >
          <Plus size={13} aria-hidden="true" />
          {isAddingPeak ? 'Click on the spectrum …' : 'Add peak'}
        </Button>
        <Button className={styles.add ?? ''} onPress={() => void suggestPeaks(workbench)}>
          Suggest
        </Button>
        {model !== undefined && (
          <Button className={styles.add ?? ''} onPress={() => addFloor(workbench)}>
            <Plus size={13} aria-hidden="true" /> Add background
          </Button>
        )}
      </div>
    </section>
  );
}

function round(energyEv: number): number {
  return Number(energyEv.toFixed(4));
}
