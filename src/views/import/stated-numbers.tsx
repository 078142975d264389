/** The numbers a file may not tell: laser, pitch, exposure, the detector. */
import { useState } from 'react';
import type { ScanChoices } from '../../io/scan-choices';
import type { ScanShape } from '../../science/scan';
import { Choice, type ChoiceItems } from '../forms/choice';
import { StatedNumber } from '../forms/stated-number';
import styles from './import-sheet.module.css';
import { shownPitch } from './shown-pitch';

export interface StatedProps {
  /** what the user has stated */
  readonly stated: ScanChoices;
  /** what is stated, and what was found where it was not */
  readonly known: ScanChoices;
  readonly onState: (stated: ScanChoices) => void;
}

type LaserUnit = NonNullable<ScanChoices['laser']>['unit'];

export function unitGroups(
  units: readonly (readonly [id: string, words: string])[],
): readonly ChoiceItems[] {
  return [{ title: '', items: units.map(([id, words]) => ({ id, words })) }];
}

const laserUnits = unitGroups([
  ['nm', 'nm'],
  ['eV', 'eV'],
  ['cm-1', 'cm⁻¹'],
]);

export function LaserEntry({ known, onState }: StatedProps): React.JSX.Element {
  const { laser } = known;
  // A unit chosen before there is a number.
  const [wanted, setWanted] = useState<LaserUnit>('nm');
  const unit = laser?.unit ?? wanted;
  return (
    <div className={styles.numbers}>
      <StatedNumber
        label="Laser"
        value={laser?.value ?? null}
        rule="positive"
        onState={(value) => onState({ laser: { value, unit } })}
      />
      <Choice
        label="Unit of the laser"
        value={unit}
        groups={laserUnits}
        onChange={(id) => {
          const next: LaserUnit = id === 'eV' || id === 'cm-1' ? id : 'nm';
          setWanted(next);
          if (laser !== undefined) onState({ laser: { value: laser.value, unit: next } });
        }}
      />
    </div>
  );
}

const lengthUnits = unitGroups([
  ['nm', 'nm'],
  ['um', 'µm'],
  ['mm', 'mm'],
]);

interface PitchProps extends StatedProps {
  /** null while the scan cannot be read */
  readonly shape: ScanShape | null;
}

export function PitchEntry({ stated, known, shape, onState }: PitchProps): React.JSX.Element {
  const pitch = known.pixel === undefined ? null : shownPitch(known.pixel);
  const [wanted, setWanted] = useState('nm');
  // Until the other direction is entered for itself, it goes along.
  const [own, setOwn] = useState({ x: pitch !== null, y: pitch !== null });
  const unit = pitch?.unit ?? wanted;
  const isOther = !lengthUnits.some(({ items }) => items.some(({ id }) => id === unit));
  const shown = pitch !== null && isOther && stated.pixel === undefined ? null : pitch;
  const [hasX, hasY] = [shape === null || shape.nx > 1, shape === null || shape.ny > 1];
  const state = (along: 'x' | 'y', value: number): void => {
    const other = along === 'x' ? 'y' : 'x';
    const otherValue = own[other] && shown !== null ? shown[other] : value;
    setOwn({ ...own, [along]: true });
    const [x, y] = along === 'x' ? [value, otherValue] : [otherValue, value];
    onState({ pixel: { x, y, unit } });
  };
  return (
    <div className={styles.numbers}>
      {(['x', 'y'] as const)
        .filter((along) => (along === 'x' ? hasX : hasY))
        .map((along) => (
          <StatedNumber
            key={along}
            label={along}
            isLabelShown
            value={shown?.[along] ?? null}
            rule="positive"
            onState={(value) => state(along, value)}
          />
        ))}
      <Choice
        label="Unit of the pitch"
        value={unit}
        groups={isOther ? [...lengthUnits, ...unitGroups([[unit, unit]])] : lengthUnits}
        onChange={(next) => {
          setWanted(next);
          if (shown !== null) onState({ pixel: { x: shown.x, y: shown.y, unit: next } });
        }}
      />
    </div>
  );
}

export function ExposureEntry({ known, onState }: StatedProps): React.JSX.Element {
  return (
    <div className={styles.numbers}>
      <StatedNumber
        label="Exposure, seconds"
        value={known.exposure_s ?? null}
        rule="positive"
        onState={(value) => onState({ exposure_s: value })}
      />
      <span>s</span>
    </div>
  );
}

const detectorFields = [
  { field: 'electrons_per_count', words: 'electrons per count', usual: 1, rule: 'positive' },
  { field: 'offset_counts', words: 'offset, counts', usual: 0, rule: 'any' },
  { field: 'read_noise_e', words: 'read noise, electrons', usual: 0, rule: 'not negative' },
  { field: 'excess_noise', words: 'excess noise factor', usual: 1, rule: 'at least one' },
] as const;

export function DetectorEntry({ known, onState }: StatedProps): React.JSX.Element {
  return (
    <div className={styles.detector}>
      {detectorFields.map(({ field, words, usual, rule }) => (
        <StatedNumber
          key={field}
          label={words}
          isLabelShown
          value={known.detector?.[field] ?? usual}
          rule={rule}
          onState={(value) => onState({ detector: { [field]: value } })}
        />
      ))}
    </div>
  );
}
