/** Settings of one component: name, shape, role, whether it may be left out, and its parameters. */
import { ArrowLeft, Trash2 } from 'lucide-react';
import { Button, Input, Label, Switch, TextField } from 'react-aria-components';
import type { ModelComponent } from '../../recipe/schema';
import type { ComponentShape } from '../../recipe/shape-parameters';
import { componentColours } from '../../state/component-colours';
import {
  deleteComponent,
  selectModel,
  setComponentName,
  setComponentOptional,
  setComponentRole,
  setComponentShape,
} from '../../state/model-actions';
import { Choice } from '../forms/choice';
import side from '../shell/side-column.module.css';
import { useRecipe, useWorkbench } from '../workbench-context';
import styles from './model-settings.module.css';
import { roleGroups, shapeGroups } from './model-words';
import { ParameterRows } from './parameter-rows';

export function ComponentSettings({ name }: { readonly name: string }): React.JSX.Element {
  const workbench = useWorkbench();
  const recipe = useRecipe((document) => document);
  const component = recipe.model?.components.find((candidate) => candidate.name === name);
  if (component === undefined) return <p className={side.hint}>Select a component of the model.</p>;
  const rename = (to: string): void => {
    if (to === '' || to === name) return;
    try {
      setComponentName(workbench, name, to);
    } catch (error) {
      workbench.notices.sayError(error);
    }
  };
  return (
    <section className={styles.section} aria-label={`Settings of component ${name}`}>
      <h2 className={side.heading}>
        Component{' '}
        <i className={styles.swatch} style={{ background: componentColours(recipe).get(name) }} />
      </h2>
      <Button className={styles.back ?? ''} onPress={() => selectModel(workbench)}>
        <ArrowLeft size={13} aria-hidden="true" /> Peak model
      </Button>
      <TextField
        key={name}
        className={styles.field ?? ''}
        defaultValue={name}
        onBlur={(event) => rename((event.target as HTMLInputElement).value.trim())}
        onKeyDown={(event) => {
          if (event.key === 'Enter') (event.target as HTMLInputElement).blur();
        }}
      >
        <Label>name</Label>
        <Input />
      </TextField>
      <div className={styles.field}>
        <span>shape</span>
        <Choice
          label="Shape"
          value={component.shape}
          groups={shapeGroups}
          onChange={(shape) => setComponentShape(workbench, name, shape as ComponentShape)}
        />
      </div>
      <div className={styles.field}>
        <span>role</span>
        <Choice
          label="Role"
          value={component.role ?? 'none'}
          groups={roleGroups}
          onChange={(role) =>
            setComponentRole(
              workbench,
              name,
              role === 'none' ? null : (role as ModelComponent['role']),
            )
          }
        />
      </div>
      <Switch
        className={styles.optional ?? ''}
        isSelected={component.optional === true}
        onChange={(isOptional) => setComponentOptional(workbench, name, isOptional)}
      >
        <i className={styles.box} aria-hidden="true" /> only where the data ask for it (BIC)
      </Switch>
      <ParameterRows component={component} />
      <Button className={styles.delete ?? ''} onPress={() => deleteComponent(workbench, name)}>
        <Trash2 size={13} aria-hidden="true" /> Delete component
      </Button>
    </section>
  );
}
