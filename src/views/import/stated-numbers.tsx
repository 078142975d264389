/** The numbers a file may not tell: laser, pitch, exposure, the ends of the axis, the detector. */
import { useState } from 'react';
import type { ScanChoices } from '../../io/scan-choices';
import { Choice } from '../forms/choice';
import { NumberEntry } from '../forms/number-entry';
import styles from './import-sheet.module.css';

interface Props {
  readonly choices: ScanChoices;
  readonly onState: (stated: ScanChoices) => void;
}

type LaserUnit = NonNullable<ScanChoices['laser']>['unit'];

const unitGroups = (units: readonly (readonly [string, string])[]) => [
  { title: '', items: units.map(([id, words]) => ({ id, words })) },
];

const laserUnits = unitGroups([
  ['nm', 'nm'],
  ['eV', 'eV'],
  ['cm-1', 'cm⁻¹'],
]);

export function LaserEntry({ choices, onState }: Props): React.JSX.Element {
  const { laser } = choices;
  const [unit, setUnit] = useState<LaserUnit>(laser?.unit ?? 'nm');
  const state = (value: number, inUnit: LaserUnit): void => {
    if (value > 0) onState({ laser: { value, unit: inUnit } });
  };
  return (
    <div className={styles.numbers}>
      <NumberEntry
        label="Laser"
        value={laser?.value ?? Number.NaN}
        step={0.1}
        onChange={(value) => state(value, unit)}
      />
      <Choice
        label="Unit of the laser"
        value={unit}
        groups={laserUnits}
        onChange={(id) => {
          const next: LaserUnit = id === 'eV' || id === 'cm-1' ? id : 'nm';
          setUnit(next);
          if (laser !== undefined) state(laser.value, next);
        }}
      />
    </div>
  );
}

const lengthUnits = unitGroups([
  ['nm', 'nm'],
  ['um', 'µm'],
]);

export function PitchEntry({ choices, onState }: Props): React.JSX.Element {
  const { pixel } = choices;
  const [unit, setUnit] = useState(pixel?.unit ?? 'nm');
  const state = (x: number, y: number, inUnit: string): void => {
    const [across, down] = [x > 0 ? x : y, y > 0 ? y : x];
    if (across > 0 && down > 0) onState({ pixel: { x: across, y: down, unit: inUnit } });
  };
  const [x, y] = [pixel?.x ?? Number.NaN, pixel?.y ?? Number.NaN];
  return (
    <div className={styles.numbers}>
      <NumberEntry label="x" value={x} step={1} onChange={(next) => state(next, y, unit)} />
      <NumberEntry label="y" value={y} step={1} onChange={(next) => state(x, next, unit)} />
      <Choice
        label="Unit of the pitch"
        value={unit}
        groups={lengthUnits}
        onChange={(next) => {
          setUnit(next);
          if (pixel !== undefined) state(x, y, next);
        }}
      />
    </div>
  );
}

export function ExposureEntry({ choices, onState }: Props): React.JSX.Element {
  return (
    <div className={styles.numbers}>
      <NumberEntry
        label="seconds"
        value={choices.exposure_s ?? Number.NaN}
        step={0.1}
        onChange={(value) => {
          if (value > 0) onState({ exposure_s: value });
        }}
      />
    </div>
  );
}

const axisKinds = unitGroups([
  ['wavelength nm', 'wavelength, nm'],
  ['energy eV', 'photon energy, eV'],
  ['energy cm-1', 'wavenumber of the light, cm⁻¹'],
  ['shift cm-1', 'Raman shift, cm⁻¹'],
]);

/** The ends of an evenly spaced axis, where the file has none. */
export function AxisEntry({ onState }: Props): React.JSX.Element {
  const [from, setFrom] = useState(Number.NaN);
  const [to, setTo] = useState(Number.NaN);
  const [kindAndUnit, setKindAndUnit] = useState('wavelength nm');
  const state = (low: number, high: number, as: string): void => {
    const [kind, unit] = as.split(' ');
    if (!Number.isFinite(low) || !Number.isFinite(high) || low === high) return;
    if (kind !== 'wavelength' && kind !== 'energy' && kind !== 'shift') return;
    onState({ axis: { from: low, to: high, kind, ...(unit === undefined ? {} : { unit }) } });
  };
  return (
    <div className={styles.numbers}>
      <NumberEntry
        label="first channel"
        value={from}
        step={1}
        onChange={(next) => {
          setFrom(next);
          state(next, to, kindAndUnit);
        }}
      />
      <NumberEntry
        label="last channel"
        value={to}
        step={1}
        onChange={(next) => {
          setTo(next);
          state(from, next, kindAndUnit);
        }}
      />
      <Choice
        label="Kind and unit of the axis"
        value={kindAndUnit}
        groups={axisKinds}
        onChange={(next) => {
          setKindAndUnit(next);
          state(from, to, next);
        }}
      />
    </div>
  );
}

const detectorFields = [
  { field: 'electrons_per_count', words: 'electrons per count', usual: 1 },
  { field: 'offset_counts', words: 'offset, counts', usual: 0 },
  { field: 'read_noise_e', words: 'read noise, electrons', usual: 0 },
  { field: 'excess_noise', words: 'excess noise factor', usual: 1 },
] as const;

interface DetectorProps {
  readonly detector: NonNullable<ScanChoices['detector']>;
  readonly onState: (stated: ScanChoices) => void;
}

export function DetectorEntry({ detector, onState }: DetectorProps): React.JSX.Element {
  return (
    <div className={styles.numbers}>
      {detectorFields.map(({ field, words, usual }) => (
        <NumberEntry
          key={field}
          label={words}
          value={detector[field] ?? usual}
          step={1}
          onChange={(value) => onState({ detector: { [field]: value } })}
        />
      ))}
    </div>
  );
}
