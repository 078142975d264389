/** The bounds a parameter has where the recipe gives none, and whether its start lies within. */
import { RimlightError } from '../errors';
import type { ConvertedValue } from './planned-values';
import type { ShapeParameter } from './shape-parameters';

/** The window that is fitted. */
export interface PlannedWindow {
  /** outer edges of its channels, eV */
  readonly fromEv: number;
  readonly toEv: number;
  /** its narrowest channel, eV */
  readonly channelEv: number;
}

export interface Bounds {
  readonly min: number;
  readonly max: number;
}

const unbounded: Bounds = { min: Number.NEGATIVE_INFINITY, max: Number.POSITIVE_INFINITY };

/** A line narrower than a thousandth of a channel, or wider than ten windows, looks the same as one at the bound. */
const narrowestChannels = 1e-3;
const widestWindows = 10;
/** A tail or decay of less than a hundredth of the window, or more than 10⁴ windows, is as good as none. */
const steepestDecay = 1e-2;
const flattestDecay = 1e4;
/** A Fano line of such |q| is a Lorentzian to one part in 10⁶. */
const greatestQ = 1e3;

/**
 * Bounds of the program's own: centres stay in the window, widths above zero, shares from 0 to 1, a decay keeps its sign. Areas
 * and levels have none, so that a faint peak's area scatters about its true value to both sides.
 */
export function ownBounds(
  parameter: ShapeParameter,
  window: PlannedWindow,
  start: number | null,
): Bounds {
  const { fromEv, toEv, channelEv } = window;
  const span = toEv - fromEv;
  switch (parameter) {
    case 'centre':
      return { min: fromEv, max: toEv };
    case 'fwhm':
    case 'fwhm_g':
    case 'fwhm_l':
    case 'tail':
      return { min: narrowestChannels * channelEv, max: widestWindows * span };
    case 'eta':
      return { min: 0, max: 1 };
    case 'q':
      return { min: -greatestQ, max: greatestQ };
    case 'decay': {
      const [least, most] = [steepestDecay * span, flattestDecay * span];
      return start !== null && start < 0 ? { min: -most, max: -least } : { min: least, max: most };
    }
    default:
      return unbounded;
  }
}

/**
 * The bounds as given, the program's own where none is given.
 *
 * @throws RimlightError 'recipe' - when nothing is left between them, or the start is not
 */
export function boundsOf(
  parameter: ShapeParameter,
  value: ConvertedValue,
  window: PlannedWindow,
  where: string,
): Bounds {
  const own = ownBounds(parameter, window, value.start);
  const min = value.min ?? Math.min(own.min, value.max ?? Number.POSITIVE_INFINITY);
  const max = value.max ?? Math.max(own.max, value.min ?? Number.NEGATIVE_INFINITY);
  if (!(min < max)) {
    throw new RimlightError('recipe', {
      what: `the bounds leave nothing between ${min} and ${max}`,
      where,
      hint: 'Give a "min" below "max".',
    });
  }
  const { start } = value;
  if (start === null || value.isFixed || (start >= min && start <= max)) return { min, max };
  const isOwn = (start < min && value.min === null) || (start > max && value.max === null);
  throw new RimlightError('recipe', {
    what: `the start ${start} is not between ${min} and ${max}`,
    where,
    hint:
      isOwn && parameter === 'centre'
        ? 'Give a centre inside the window, widen model.window, or state "min" and "max".'
        : 'Give a start between the bounds.',
  });
}
