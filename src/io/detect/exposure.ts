/** Exposure of a pixel and the way rows were scanned: stated, or written in the file. */
import { RimlightError } from '../../errors';
import { formatSignificant } from '../../science/format';
import type { Guess } from '../scan-plan';
import type { Saying } from './sayings';
import { secondsIn } from './words';

const exposureWords =
  /\b(exposure( time)?|integration( time)?|acquisition time|dwell( time)?|count(ing)? time|accumulation time)\b/;
const otherTimes = /\b(number|count|start|end|date|total)\b(?! time)/;

/** @throws RimlightError 'recipe' - when the stated exposure is no time */
export function findExposure(
  stated: number | undefined,
  sayings: readonly Saying[],
): { readonly exposureS: number | null; readonly guess: Guess } {
  const answer = (exposureS: number | null, source: Guess['source'], evidence: string) => ({
    exposureS,
    guess: {
      field: 'exposure' as const,
      label: exposureS === null ? 'unknown' : `${Number(exposureS.toPrecision(6))} s`,
      source,
      evidence,
      alternatives: [],
    },
  });
  if (stated !== undefined) {
    if (stated > 0 && Number.isFinite(stated))
      return answer(stated, 'stated', 'stated by the recipe');
    throw new RimlightError('recipe', {
      what: `an exposure cannot be ${formatSignificant(stated, 3)} s`,
      where: 'scan.exposure_s',
      hint: 'State a time in seconds, above zero.',
    });
  }
  for (const saying of sayings) {
    if (!exposureWords.test(saying.words) || otherTimes.test(saying.words)) continue;
    const perS = saying.unit === null ? 1 : secondsIn(saying.unit);
    if (perS === null || !(saying.number > 0)) continue;
    const how = saying.unit === null ? ', taken as seconds' : '';
    const exposureS = Number((saying.number * perS).toPrecision(12));
    return answer(exposureS, 'file', `the file states ${saying.shown}${how}`);
  }
  return answer(null, 'absent', 'nothing in the file states it; it is needed only for count rates');
}

const patternWords =
  /\b(serpentine|snake|meander|bidirectional|boustrophedon|scan (pattern|mode|direction|type))\b/;

export function findSerpentine(
  stated: boolean | undefined,
  sayings: readonly Saying[],
  ny: number,
): { readonly isSerpentine: boolean; readonly guess: Guess } {
  const answer = (isSerpentine: boolean, source: Guess['source'], evidence: string) => ({
    isSerpentine,
    guess: {
      field: 'serpentine' as const,
      label:
        source === 'absent'
          ? '–'
          : isSerpentine
            ? 'odd rows right to left'
            : 'every row left to right',
      source,
      evidence,
      alternatives:
        ny < 2
          ? []
          : [
              {
                label: isSerpentine ? 'every row left to right' : 'odd rows right to left',
                evidence: 'if every other row looks mirrored',
                choice: { serpentine: !isSerpentine },
              },
            ],
    },
  });
  if (stated !== undefined) return answer(stated, 'stated', 'stated by the recipe');
  if (ny < 2) return answer(false, 'absent', 'one row has no order of rows');
  for (const saying of sayings) {
    if (!patternWords.test(saying.words)) continue;
    const says = `the file states ${saying.shown}`;
    if (/serpentine|snake|meander|bidirectional|boustrophedon/i.test(saying.text))
      return answer(true, 'file', says);
    if (/^(1|true|yes)$/i.test(saying.text) && !/scan/.test(saying.words))
      return answer(true, 'file', says);
    if (/^(0|false|no)$/i.test(saying.text) || /raster|unidirectional/i.test(saying.text)) {
      return answer(false, 'file', says);
    }
  }
  return answer(false, 'guess', 'nothing in the file says that rows alternate');
}
