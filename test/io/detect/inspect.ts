/** Looks at an in-memory file, and picks out of what was found. */
import { detectScan } from '../../../src/io/detect/detect-scan';
import type { ScanChoices } from '../../../src/io/scan-choices';
import type { Companion, Guess, GuessField, Inspection, ScanPlan } from '../../../src/io/scan-plan';
import { type FakeArray, type FakeFile, fakeContainer, numbered, ramp } from '../fake-container';

export const inspect = (
  file: FakeFile,
  choices: ScanChoices = {},
  companions: readonly Companion[] = [],
  name = 'scan.h5',
): Promise<Inspection> => detectScan(fakeContainer(file), companions, choices, name);

export function guess(inspection: Inspection, field: GuessField): Guess {
  const found = inspection.guesses.find((one) => one.field === field);
  if (found === undefined)
    throw new Error(`no guess of ${field}: ${inspection.problems.map(String).join('; ')}`);
  return found;
}

export function planOf(inspection: Inspection): ScanPlan {
  if (inspection.plan === null) throw new Error(inspection.problems.map(String).join('; '));
  return inspection.plan;
}

/** 600 nm upwards */
export const wavelengths = (length: number): FakeArray => ({
  shape: [length],
  data: ramp(length, 600, 0.5),
  attributes: { units: 'nm' },
});

/** 4 × 3 pixels of ten channels from 600 nm, nothing else */
export const plain: FakeFile = {
  arrays: { '/scan/counts': numbered(4, 3, 10), '/scan/wavelength': wavelengths(10) },
};
