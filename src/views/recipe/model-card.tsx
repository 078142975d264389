/** The peak model's step: what it is made of, and whether the maps on screen are of it. */
import { useStore } from 'zustand';
import { fitKey } from '../../state/fit-actions';
import { selectModel } from '../../state/model-actions';
import { useRecipe, useSession, useView, useWorkbench } from '../workbench-context';
import { StepCard } from './step-card';

export function ModelCard({ isUnbuilt }: { readonly isUnbuilt: boolean }): React.JSX.Element {
  const workbench = useWorkbench();
  const recipe = useRecipe((document) => document);
  const selection = useView((view) => view.selection);
  const scanNumber = useSession((session) => session.scanNumber);
  const { madeOf, isRunning } = useStore(workbench.fit);
  const isSelected = selection.kind === 'model' || selection.kind === 'component';
  const names = recipe.model?.components.map(({ name }) => name) ?? [];
  const isCurrent = madeOf === fitKey(scanNumber, recipe);
  const progress = isRunning ? 'fitting …' : isCurrent ? 'all pixels fitted' : 'not fitted yet';
  const detail =
    names.length === 0 ? 'suggest one, or add peaks' : `${names.join(' + ')}, ${progress}`;
  return (
    <StepCard
      title="Peak model"
      detail={isUnbuilt ? 'this build cannot run it yet' : detail}
      state={isUnbuilt ? 'refused' : isSelected ? 'now' : isCurrent ? 'done' : 'off'}
      onPress={() => selectModel(workbench)}
      pressLabel="Settings of the peak model"
    />
  );
}
