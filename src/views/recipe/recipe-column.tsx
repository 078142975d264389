/** Left column: the recipe step by step, each with what it is in one line, then the pins. */
import { useMemo } from 'react';
import { selectBand } from '../../state/band-actions';
import { bandColours } from '../../state/band-colours';
import { reviseImport } from '../../state/scan-opening';
import { unbuiltByPath } from '../../state/unbuilt-blocks';
import side from '../shell/side-column.module.css';
import { useRecipe, useSession, useView, useWorkbench } from '../workbench-context';
import { ConditionSteps } from './condition-steps';
import { ModelCard } from './model-card';
import { PinList } from './pin-list';
import { readingInWords } from './reading-words';
import styles from './recipe-column.module.css';
import { StepCard } from './step-card';

export function RecipeColumn(): React.JSX.Element {
  const workbench = useWorkbench();
  const recipe = useRecipe((document) => document);
  const scan = useSession((session) => session.scan);
  const selection = useView((view) => view.selection);
  const unbuilt = useMemo(() => unbuiltByPath(recipe), [recipe]);
  const colours = useMemo(() => bandColours(recipe), [recipe]);
  const bands = recipe.bands ?? [];
  const channels = recipe.blend?.channels ?? [];
  const isBandSelected = selection.kind === 'band';
  return (
    <aside className={`${side.column} ${styles.column}`} aria-label="Recipe">
      <h2 className={side.heading}>
        Recipe <span>{recipe.title ?? ''}</span>
      </h2>
      <ol className={styles.steps}>
        <StepCard
          title="Read"
          detail={scan === null ? 'no scan yet' : readingInWords(scan.open.plan)}
          state={scan === null ? 'off' : 'done'}
          onPress={scan === null ? null : () => reviseImport(workbench)}
          pressLabel="Correct how the scan is read"
        />
        <ConditionSteps unbuilt={unbuilt} />
        <StepCard
          title="Bands"
          detail={
            bands.length === 0 ? 'drag across the spectrum to make one' : `${bands.length} named`
          }
          state={bands.length === 0 ? 'off' : isBandSelected ? 'now' : 'done'}
          onPress={
            bands[0] === undefined ? null : () => selectBand(workbench, bands[0]?.name ?? '')
          }
          pressLabel="Settings of the bands"
        >
          <ul className={styles.chips}>
            {bands.map(({ name }) => (
              <li key={name}>
                <button
                  type="button"
                  className={styles.chip}
                  aria-pressed={selection.kind === 'band' && selection.name === name}
                  onClick={() => selectBand(workbench, name)}
                >
                  <i style={{ background: colours.get(name) }} />
                  {name}
                </button>
              </li>
            ))}
          </ul>
        </StepCard>
        <ModelCard isUnbuilt={unbuilt.has('model')} />
        {(['strain', 'features'] as const).map((path) => {
          const title = unbuilt.get(path);
          if (title === undefined) return null;
          return (
            <StepCard
              key={path}
              title={title.replace(/^the /, '').replace(/^./, (letter) => letter.toUpperCase())}
              detail="this build cannot run it yet"
              state="refused"
              onPress={null}
              pressLabel=""
            />
          );
        })}
        <StepCard
          title="Blend"
          detail={
            channels.length === 0
              ? 'no channels'
              : `${channels.length} channels, ${recipe.blend?.mode ?? 'additive'}`
          }
          state={channels.length === 0 ? 'off' : selection.kind === 'blend' ? 'now' : 'done'}
          onPress={() => workbench.view.setState({ selection: { kind: 'blend' } })}
          pressLabel="Settings of the blend"
        />
      </ol>
      <PinList />
    </aside>
  );
}
