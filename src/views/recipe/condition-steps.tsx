/** The conditioning steps of the recipe, in order, each with its switch. */
import { switchStep } from '../../state/step-actions';
import { useRecipe, useWorkbench } from '../workbench-context';
import { StepCard } from './step-card';

interface Props {
  /** paths of what cannot be run */
  readonly unbuilt: ReadonlyMap<string, string>;
}

export function ConditionSteps({ unbuilt }: Props): React.JSX.Element {
  const workbench = useWorkbench();
  const steps = useRecipe((document) => document.condition) ?? [];
  return (
    <>
      {steps.map((step, index) => {
        const isRefused = unbuilt.has(`condition[${index}]`);
        const isOff = step.off === true;
        return (
          <StepCard
            key={`${step.step}-${steps.slice(0, index).filter((earlier) => earlier.step === step.step).length}`}
            title={step.step}
            detail={isOff ? 'left out' : isRefused ? 'this build cannot run it yet' : 'in use'}
            state={isOff ? 'off' : isRefused ? 'refused' : 'done'}
            onPress={null}
            pressLabel=""
            onSwitch={() => switchStep(workbench, index)}
          />
        );
      })}
    </>
  );
}
