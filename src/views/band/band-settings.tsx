/** Settings of one band: name, ends in any unit, floor, and which of its maps leads. */
import { Trash2 } from 'lucide-react';
import { Button, Input, Label, Radio, RadioGroup, TextField } from 'react-aria-components';
import { bandQuantities } from '../../science/bands/band';
import { deleteBand, setBandEnds, setBandName, setFloor } from '../../state/band-actions';
import { bandColours } from '../../state/band-colours';
import { showLeadMap } from '../../state/lead-actions';
import { StatedNumber } from '../forms/stated-number';
import side from '../shell/side-column.module.css';
import { useRecipe, useView, useWorkbench } from '../workbench-context';
import styles from './band-settings.module.css';

const quantityWords = {
  integral: 'counts',
  centroid: 'centroid',
  median: 'median',
  spread: 'spread',
  peak: 'peak',
  peak_at: 'peak energy',
} as const;

const floors = [
  { value: 'none', words: 'none' },
  { value: 'ends', words: 'line between its ends' },
] as const;

export function BandSettings({ name }: { readonly name: string }): React.JSX.Element {
  const workbench = useWorkbench();
  const recipe = useRecipe((document) => document);
  const leadMap = useView((view) => view.leadMap);
  const band = recipe.bands?.find((candidate) => candidate.name === name);
  if (band === undefined) return <p className={side.hint}>Select a band on the spectrum.</p>;
  const unit = band.unit === 'cm-1' ? 'cm⁻¹' : band.unit;
  return (
    <section className={styles.section} aria-label={`Settings of band ${name}`}>
      <h2 className={side.heading}>
        Band <i className={styles.swatch} style={{ background: bandColours(recipe).get(name) }} />
      </h2>
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
      <div className={styles.ends}>
        <StatedNumber
          label={`from, ${unit}`}
          isLabelShown
          value={band.from}
          rule="any"
          onState={(from) => setBandEnds(workbench, name, from, band.to)}
        />
        <StatedNumber
          label={`to, ${unit}`}
          isLabelShown
          value={band.to}
          rule="any"
          onState={(to) => setBandEnds(workbench, name, band.from, to)}
        />
      </div>
      <RadioGroup
        className={styles.radios ?? ''}
        value={band.floor ?? 'none'}
        onChange={(value) => setFloor(workbench, name, value === 'ends' ? 'ends' : 'none')}
      >
        <Label>floor</Label>
        {floors.map(({ value, words }) => (
          <Radio key={value} value={value} className={styles.radio ?? ''}>
            {words}
          </Radio>
        ))}
      </RadioGroup>
      <fieldset className={styles.quantities}>
        <legend>show as the lead map</legend>
        {bandQuantities.map((quantity) => {
          const map = `band.${name}.${quantity}`;
          return (
            <button
              key={quantity}
              type="button"
              aria-pressed={leadMap === map}
              onClick={() => showLeadMap(workbench, map)}
            >
              {quantityWords[quantity]}
            </button>
          );
        })}
      </fieldset>
      <Button className={styles.delete ?? ''} onPress={() => deleteBand(workbench, name)}>
        <Trash2 size={13} aria-hidden="true" /> Delete band
      </Button>
    </section>
  );

  function rename(to: string): void {
    try {
      if (to !== '') setBandName(workbench, name, to);
    } catch (error) {
      workbench.notices.sayError(error);
    }
  }
}
