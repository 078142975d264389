/** How far pixels lie apart by what the file states beside its arrays: attributes, scalars, TIFF resolution. */
import type { PositionAxis } from '../../science/scan';
import type { Saying } from './sayings';
import { nmIn } from './words';

/** Positions nothing is known of: counted in pixels. */
export function unknownAxis(label: string): PositionAxis {
  return { label, unit: 'px', isLength: false, pitch: 1, values: null };
}

/** 0.1 µm is 100 nm, not 100.00000000000001. */
export function roundedTo12(value: number): number {
  return Number(value.toPrecision(12));
}

const pitchWords =
  /^((pixel|px) (size|pitch|spacing|step|width|height)|(step|scan step) ?(size|width|pitch)?|pitch|spacing|resolution|(x|y) (step|pitch|spacing|resolution|pixel size)|pixel)( (x|y))?( (nm|um|µm|mm|m))?$/;

/** Pitch from attributes of the cube first, then of its folders, then of the file. */
export function pitchOfSayings(
  sayings: readonly Saying[],
  cubePath: string,
): { x: PositionAxis; y: PositionAxis; evidence: string } | null {
  const usable = sayings
    .filter(
      ({ words, number, unit }) =>
        pitchWords.test(words) && number > 0 && unit !== null && nmIn(unit) !== null,
    )
    .sort((a, b) => closeness(b, cubePath) - closeness(a, cubePath));
  const sayingOf = (along: 'x' | 'y'): Saying | undefined =>
    usable.find(({ words }) => words.split(' ').includes(along)) ??
    usable.find(({ words }) => !/\b[xy]\b/.test(words) && !/\b(height|width)\b/.test(words)) ??
    usable.find(({ words }) => words.includes(along === 'x' ? 'pixel width' : 'pixel height'));
  const sx = sayingOf('x');
  const sy = sayingOf('y') ?? sx;
  if (sx === undefined || sy === undefined) return null;
  const axisOf = (label: 'x' | 'y', { number, numbers, unit }: Saying): PositionAxis => {
    const pair = numbers.length === 2 && numbers[0] === numbers[1];
    const step = pair || numbers.length < 2 ? number : Number.NaN;
    return {
      label,
      unit: 'nm',
      isLength: true,
      pitch: roundedTo12(step * (nmIn(unit ?? '') ?? 1)),
      values: null,
    };
  };
  const x = axisOf('x', sx);
  const y = axisOf('y', sy);
  // A pair of two different numbers does not say which is x.
  if (Number.isNaN(x.pitch) || Number.isNaN(y.pitch)) return null;
  return {
    x,
    y,
    evidence: `the file states ${sx === sy ? sx.shown : `${sx.shown} and ${sy.shown}`}`,
  };
}

function closeness({ of }: Saying, cubePath: string): number {
  return cubePath === of ? 1e6 : cubePath.startsWith(of) ? of.length : 0;
}
