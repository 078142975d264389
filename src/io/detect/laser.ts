/** The laser: stated, written in the file, told by two axes, or named in the file's name. */
import { RimlightError } from '../../errors';
import { type LaserLine, laserEvFrom } from '../../science/laser';
import { nmFromEv } from '../../science/units';
import type { ScanChoices } from '../scan-choices';
import type { Alternative, Guess } from '../scan-plan';
import type { Agreement } from './agreement';
import { shown } from './roles';
import type { Saying } from './sayings';

export interface FoundLaser {
  readonly line: LaserLine;
  readonly source: 'stated' | 'file' | 'guess';
  readonly evidence: string;
  readonly alternatives: readonly Alternative[];
}

export interface LaserQuestion {
  readonly stated: ScanChoices['laser'];
  readonly sayings: readonly Saying[];
  readonly agreement: Agreement;
  readonly fileName: string;
  /** a Raman shift cannot be used without it: then the file's name is believed too */
  readonly isNeeded: boolean;
}

/**
 * The laser line, or null where nothing tells it.
 *
 * @throws RimlightError 'recipe' - when the stated one is no photon energy
 */
export function findLaser(question: LaserQuestion): FoundLaser | null {
  const { stated } = question;
  if (stated !== undefined) assertUsable(stated);
  const found = [
    stated === undefined
      ? null
      : { line: stated, source: 'stated' as const, evidence: 'stated by the recipe' },
    laserOfAxes(question.agreement),
    laserOfSayings(question.sayings),
    question.isNeeded ? laserOfName(question.fileName) : null,
  ].filter((one) => one !== null);
  const [best, ...others] = found;
  if (best === undefined) return null;
  return {
    ...best,
    alternatives: others
      .filter(({ line }) => laserLabel(line) !== laserLabel(best.line))
      .map(({ line, evidence }) => ({
        label: laserLabel(line),
        evidence,
        choice: { laser: line },
      })),
  };
}

function assertUsable(stated: LaserLine): void {
  const energyEv = laserEvFrom(stated, 'vacuum');
  if (energyEv > 0.05 && energyEv < 50) return;
  throw new RimlightError('recipe', {
    what: `a laser of ${stated.value} ${stated.unit} has no photon energy a spectrograph could use`,
    where: 'scan.laser',
    hint: 'State its wavelength in nm, its photon energy in eV, or its wavenumber in cm-1.',
  });
}

/** "532.14 nm (18792.04 cm⁻¹)" for a wavenumber, as stated otherwise. */
export function laserLabel({ value, unit }: LaserLine): string {
  if (unit !== 'cm-1') return `${shown(value)} ${unit}`;
  const nm = nmFromEv(laserEvFrom({ value, unit }, 'vacuum'));
  return `${nm.toFixed(2)} nm in vacuum (${value.toFixed(2)} cm⁻¹)`;
}

type Lead = Pick<FoundLaser, 'line' | 'source' | 'evidence'>;

function laserOfAxes({ laser }: Agreement): Lead | null {
  if (laser === null) return null;
  const line = { value: Number(laser.cm1.toFixed(3)), unit: 'cm-1' as const };
  return { line, source: 'file', evidence: laser.evidence };
}

const laserWords = /\b(laser|excitation|exciting|incident|lambda ?0|pump)\b/;
const otherLaserWords =
  /\b(power|intensity|current|spot|size|exposure|filter|mode|temperature|polari[sz]ation|angle|grating|serial|diameter|fluence|repetition|pulse|width|duration)\b/;

function laserOfSayings(sayings: readonly Saying[]): Lead | null {
  for (const saying of sayings) {
    if (!laserWords.test(saying.words) || otherLaserWords.test(saying.words)) continue;
    const line = lineOf(saying);
    if (line !== null) return { line, source: 'file', evidence: `the file states ${saying.shown}` };
  }
  return null;
}

/** Without a unit the size tells: eV below 10, nm from 150 to 3000, cm⁻¹ above. */
function lineOf({ number, unit }: Saying): LaserLine | null {
  if (!(number > 0)) return null;
  if (unit === 'eV' && number < 50) return { value: number, unit: 'eV' };
  if (unit === 'meV') return { value: number / 1000, unit: 'eV' };
  if (unit === 'cm-1' && number > 1000) return { value: number, unit: 'cm-1' };
  const nmPer =
    unit === 'nm'
      ? 1
      : unit === 'um'
        ? 1000
        : unit === 'angstrom'
          ? 0.1
          : unit === 'm'
            ? 1e9
            : null;
  if (nmPer !== null) {
    const value = Number((number * nmPer).toPrecision(12));
    return value > 100 && value < 20_000 ? { value, unit: 'nm' } : null;
  }
  if (unit !== null) return null;
  if (number > 0.5 && number < 10) return { value: number, unit: 'eV' };
  if (number >= 150 && number <= 3000) return { value: number, unit: 'nm' };
  return number > 3000 && number < 60_000 ? { value: number, unit: 'cm-1' } : null;
}

/** Laser lines met in laboratories, nm (common practice, no source); a file name is believed only for one of these. */
const usualLasersNm = [
  244, 257, 266, 325, 355, 405, 442, 457, 458, 473, 476, 488, 496, 514, 514.5, 515, 532, 552, 561,
  568, 594, 632.8, 633, 635, 637, 638, 640, 647, 656, 660, 671, 676, 690, 730, 752, 780, 785, 808,
  830, 852, 980, 1030, 1064, 1550,
];

function laserOfName(fileName: string): Lead | null {
  for (const match of fileName.matchAll(/(?<![\d.,])(\d{3,4}(?:[.,]\d{1,3})?)\s?nm(?![a-z])/gi)) {
    const value = Number(match[1].replace(',', '.'));
    if (!usualLasersNm.some((usual) => Math.abs(usual - value) < 0.5)) continue;
    return {
      line: { value, unit: 'nm' },
      source: 'guess',
      evidence: `the file’s name says ${match[0]}, a usual laser line; nothing inside the file states the laser`,
    };
  }
  return null;
}

export function laserGuess(laser: FoundLaser | null, isNeeded: boolean): Guess {
  if (laser === null) {
    return {
      field: 'laser',
      label: 'unknown',
      source: isNeeded ? 'missing' : 'absent',
      evidence: isNeeded
        ? 'a Raman shift becomes a photon energy only with the laser, and nothing in the file states it'
        : 'nothing in the file states it; without it no Raman shifts are shown',
      alternatives: [],
    };
  }
  const { line, source, evidence, alternatives } = laser;
  return { field: 'laser', label: laserLabel(line), source, evidence, alternatives };
}

/** For a shift axis whose laser nothing tells. */
export function missingLaser(where: string): RimlightError {
  return new RimlightError('scan', {
    what: 'the axis is a Raman shift, and the laser is not stated',
    where,
    hint: 'State scan.laser, for example { "value": 532, "unit": "nm" }.',
  });
}
