/** Each parameter of a component: where it starts, its bounds, whether it is held. */
import { Switch } from 'react-aria-components';
import type { ModelComponent } from '../../recipe/schema';
import { parametersOf, setComponentParameter, specOf } from '../../state/model-actions';
import { StatedNumber } from '../forms/stated-number';
import { useWorkbench } from '../workbench-context';
import styles from './model-settings.module.css';
import { parameterInWords, unitOfParameter } from './model-words';

export function ParameterRows({ component }: { readonly component: ModelComponent }) {
  const workbench = useWorkbench();
  const { name } = component;
  return (
    <table className={styles.parameters}>
      <thead>
        <tr>
          <td />
          <th scope="col">start</th>
          <th scope="col">least</th>
          <th scope="col">most</th>
          <th scope="col">held</th>
        </tr>
      </thead>
      <tbody>
        {parametersOf(component).map((parameter) => {
          const { start, min, max, fixed, tie, unit } = specOf(component, parameter);
          const shown = unitOfParameter(parameter, unit);
          const words = parameterInWords(parameter);
          return (
            <tr key={parameter} data-parameter={parameter}>
              <th scope="row">
                {words} <small>{shown}</small>
                {tie !== undefined && <small className={styles.tie}>= {tie.to}</small>}
              </th>
              {(['start', 'min', 'max'] as const).map((field) => (
                <td key={field}>
                  <StatedNumber
                    label={`${field} of ${words}`}
                    value={{ start, min, max }[field] ?? null}
                    rule="any"
                    onState={(value) =>
                      setComponentParameter(workbench, name, parameter, { [field]: value })
                    }
                    onClear={() =>
                      setComponentParameter(workbench, name, parameter, { [field]: null })
                    }
                  />
                </td>
              ))}
              <td>
                <Switch
                  className={styles.held ?? ''}
                  isSelected={fixed === true}
                  isDisabled={start === undefined}
                  aria-label={`Hold ${words}`}
                  onChange={(isHeld) =>
                    setComponentParameter(workbench, name, parameter, { fixed: isHeld })
                  }
                >
                  <i className={styles.box} aria-hidden="true" />
                </Switch>
              </td>
            </tr>
          );
        })}
      </tbody>
    </table>
  );
}
