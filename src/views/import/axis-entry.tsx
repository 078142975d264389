/** The ends of an evenly spaced axis, where the file has none. */
import { useState } from 'react';
import { Choice } from '../forms/choice';
import { StatedNumber } from '../forms/stated-number';
import styles from './import-sheet.module.css';
import { type StatedProps, unitGroups } from './stated-numbers';

const axisKinds = unitGroups([
  ['wavelength nm', 'wavelength, nm'],
  ['energy eV', 'photon energy, eV'],
  ['energy cm-1', 'wavenumber of the light, cm⁻¹'],
  ['shift cm-1', 'Raman shift, cm⁻¹'],
]);

export function AxisEntry({ known, onState }: StatedProps): React.JSX.Element {
  const { axis } = known;
  const found =
    axis?.from === undefined || axis.kind === undefined || axis.unit === undefined
      ? null
      : `${axis.kind} ${axis.unit}`;
  const [from, setFrom] = useState<number | null>(axis?.from ?? null);
  const [to, setTo] = useState<number | null>(axis?.to ?? null);
  // A kind chosen before there are both ends; afterwards it may also be corrected in its own row.
  const [wanted, setWanted] = useState('wavelength nm');
  const as = found ?? wanted;
  const isListed = axisKinds.some(({ items }) => items.some(({ id }) => id === as));
  const state = (first: number | null, last: number | null, kindAndUnit: string): void => {
    const [kind, unit] = kindAndUnit.split(' ');
    if (first === null || last === null || first === last || unit === undefined) return;
    if (kind !== 'wavelength' && kind !== 'energy' && kind !== 'shift') return;
    onState({ axis: { from: first, to: last, kind, unit } });
  };
  return (
    <div className={styles.numbers}>
      <StatedNumber
        label="from"
        isLabelShown
        value={from}
        rule="any"
        onState={(next) => {
          setFrom(next);
          state(next, to, as);
        }}
      />
      <StatedNumber
        label="to"
        isLabelShown
        value={to}
        rule="any"
        onState={(next) => {
          setTo(next);
          state(from, next, as);
        }}
      />
      <Choice
        label="Kind and unit of the axis"
        value={as}
        groups={isListed ? axisKinds : [...axisKinds, ...unitGroups([[as, as.replace(' ', ', ')]])]}
        onChange={(next) => {
          setWanted(next);
          state(from, to, next);
        }}
      />
    </div>
  );
}
