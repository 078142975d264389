/** The words of the model's settings. */
import type { ChoiceItems } from '../forms/choice';

export const shapeGroups: readonly ChoiceItems[] = [
  {
    title: 'Peaks',
    items: [
      { id: 'gaussian', words: 'gaussian' },
      { id: 'lorentzian', words: 'lorentzian' },
      { id: 'pseudo-voigt', words: 'pseudo-voigt' },
      { id: 'voigt', words: 'voigt' },
      { id: 'tailed', words: 'tailed' },
      { id: 'fano', words: 'fano' },
    ],
  },
  {
    title: 'Backgrounds',
    items: [
      { id: 'flat', words: 'flat' },
      { id: 'line', words: 'line' },
      { id: 'parabola', words: 'parabola' },
      { id: 'decay', words: 'decay' },
    ],
  },
];

export const roleGroups: readonly ChoiceItems[] = [
  {
    title: '',
    items: ['none', 'exciton', 'trion', 'localised', 'interlayer', 'raman'].map((id) => ({
      id,
      words: id === 'raman' ? 'Raman line' : id,
    })),
  },
];

export const noiseGroups: readonly ChoiceItems[] = [
  {
    title: '',
    items: [
      { id: 'usual', words: 'as the scan says' },
      { id: 'poisson', words: 'Poisson counts' },
      { id: 'gaussian', words: 'detector variance' },
      { id: 'uniform', words: 'every channel alike' },
    ],
  },
];

const parameterWords: Readonly<Record<string, string>> = {
  fwhm_g: 'fwhm, Gaussian',
  fwhm_l: 'fwhm, Lorentzian',
  eta: 'Lorentzian share',
};

export function parameterInWords(parameter: string): string {
  return parameterWords[parameter] ?? parameter;
}

/** Units of parameters that have none of their own in the recipe. */
export function unitOfParameter(parameter: string, unit: string | undefined): string {
  switch (parameter) {
    case 'area':
      return 'counts';
    case 'level':
      return 'counts/ch';
    case 'slope':
      return 'per eV';
    case 'curvature':
      return 'per eV²';
    case 'eta':
    case 'q':
      return '';
    default:
      return unit === 'cm-1' ? 'cm⁻¹' : (unit ?? 'eV');
  }
}
