/** The noise model: a detector the recipe states, Poisson for whole-number counts, none for anything else. */
import { RimlightError } from '../../errors';
import { formatCount } from '../../science/format';
import type { NoiseModel } from '../../science/scan';
import type { ArrayEntry } from '../container';
import type { ScanChoices } from '../scan-choices';
import type { Alternative, Guess } from '../scan-plan';
import { shown } from './roles';
import type { ValueSample } from './sample';
import { entryUnit, entryWords, nameOf, textAttribute } from './words';

/** Quantities that are ratios of light: never counts, even where the numbers happen to be whole. */
const ratios =
  /\b(absorbance|absorption|transmi(ttance|ssion)|reflect(ance|ivity)|extinction|optical density)\b/;

/** "counts", or what the file calls its values: "absorbance", "intensity". */
export function quantityOf(entry: ArrayEntry): string {
  const words = entryWords(entry);
  if (entryUnit(entry)?.unit === 'counts' || /\b(counts?|cts|adu|photons)\b/.test(words))
    return 'counts';
  const ratio = ratios.exec(words);
  if (ratio !== null) return ratio[1];
  const name = textAttribute(entry.attributes, 'long_name', 'label') ?? nameOf(entry.path);
  const plain = name
    .replace(/\s*[([].*$/, '')
    .replace(/_/g, ' ')
    .trim()
    .toLowerCase();
  return plain === '' || /^(column|array|arr|data|cube|scan|values?)?[ _]?\d*$/.test(plain)
    ? 'counts'
    : plain;
}

/** @throws RimlightError 'recipe' - when the detector block holds what no detector can have */
export function findNoise(
  stated: ScanChoices['detector'],
  sample: ValueSample,
  quantity: string,
): { readonly noise: NoiseModel; readonly guess: Guess } {
  if (stated !== undefined) return statedDetector(stated);
  const missing = sample.looked - sample.finite;
  const seen = `${formatCount(sample.looked)} values looked at${missing === 0 ? '' : `, ${formatCount(missing)} of them without data`}`;
  const guess = (
    label: string,
    evidence: string,
    alternatives: readonly Alternative[] = [],
  ): Guess => ({ field: 'noise', label, source: 'file', evidence, alternatives });
  if (ratios.test(quantity)) {
    return { noise: { kind: 'none' }, guess: guess('none', `${quantity} is a ratio, not counts`) };
  }
  if (sample.isWhole && sample.min >= 0) {
    return {
      noise: { kind: 'poisson' },
      guess: guess(
        'Poisson',
        `whole numbers from ${shown(sample.min)} to ${shown(sample.max)} (${seen})`,
        [detectorAlternative],
      ),
    };
  }
  const why =
    sample.min < 0
      ? `negative values down to ${shown(sample.min)}: something was subtracted, so the numbers are no counts as detected`
      : 'values are not whole numbers: averaged, scaled or corrected, so no counts as detected';
  return {
    noise: { kind: 'none' },
    guess: guess('none', `${why} (${seen}); a detector block would give a noise model`, [
      detectorAlternative,
    ]),
  };
}

const detectorAlternative: Alternative = {
  label: 'detector, 1 electron per count',
  evidence: 'variance from a detector block, whose numbers you then state',
  choice: {
    detector: { electrons_per_count: 1, offset_counts: 0, read_noise_e: 0, excess_noise: 1 },
  },
};

function statedDetector(stated: NonNullable<ScanChoices['detector']>): {
  readonly noise: NoiseModel;
  readonly guess: Guess;
} {
  const detector = {
    electronsPerCount: stated.electrons_per_count ?? 1,
    offsetCounts: stated.offset_counts ?? 0,
    readNoiseE: stated.read_noise_e ?? 0,
    excessNoise: stated.excess_noise ?? 1,
  };
  const check = (isFine: boolean, field: string, value: number, expected: string): void => {
    if (isFine && Number.isFinite(value)) return;
    throw new RimlightError('recipe', {
      what: `a detector cannot have ${field.replace(/_/g, ' ')} ${value}`,
      where: `scan.detector.${field}`,
      hint: `State ${expected}.`,
    });
  };
  check(
    detector.electronsPerCount > 0,
    'electrons_per_count',
    detector.electronsPerCount,
    'a number above zero',
  );
  check(true, 'offset_counts', detector.offsetCounts, 'a finite number');
  check(detector.readNoiseE >= 0, 'read_noise_e', detector.readNoiseE, 'zero or more electrons');
  check(detector.excessNoise >= 1, 'excess_noise', detector.excessNoise, '1 or more');
  return {
    noise: { kind: 'detector', detector },
    guess: {
      field: 'noise',
      label: `detector, ${shown(detector.electronsPerCount)} electrons per count`,
      source: 'stated',
      evidence: `stated by the recipe: offset ${shown(detector.offsetCounts)} counts, read noise ${shown(detector.readNoiseE)} electrons, excess noise ${shown(detector.excessNoise)}`,
      alternatives: [],
    },
  };
}
