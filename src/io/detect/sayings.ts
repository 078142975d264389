/** Single values a file states beside its arrays: attributes of arrays and groups, scalars, reader's facts. */
import type { AttributeValue, Container, ReadOptions } from '../container';
import { type KnownUnit, nameOf, parseUnit, spaced, textAttribute, unitInName } from './words';

export interface Saying {
  /** its name in lower case with single spaces: "laser wavelength nm" */
  readonly words: string;
  /** as shown: "/entry/laser = 532.06 nm" */
  readonly shown: string;
  /** the number in the value; NaN where it has none */
  readonly number: number;
  /** several numbers, where the value is a list */
  readonly numbers: readonly number[];
  readonly unit: KnownUnit | null;
  readonly text: string;
  /** array or group it belongs to; "" for the file */
  readonly of: string;
}

/** Everything stated, in the file's order: the reader's facts, then scalars, then attributes. */
export async function readSayings(
  container: Container,
  options: ReadOptions,
): Promise<readonly Saying[]> {
  const sayings: Saying[] = [];
  for (const [key, value] of Object.entries(container.facts)) {
    sayings.push(saying(key, value, null, ''));
  }
  for (const entry of container.entries) {
    const size = entry.shape.reduce((product, count) => product * count, 1);
    if (size !== 1 || sayings.length > 2000) continue;
    const values = await container.read(
      entry.path,
      entry.shape.map(() => 0),
      entry.shape,
      options,
    );
    sayings.push(
      saying(entry.path, values[0], textAttribute(entry.attributes, 'units', 'unit'), ''),
    );
  }
  for (const { path, attributes } of [...container.groups, ...container.entries]) {
    for (const [key, value] of Object.entries(attributes)) {
      const unit = textAttribute(
        attributes,
        `${key.toLowerCase()}_units`,
        `${key.toLowerCase()}_unit`,
      );
      sayings.push(saying(key, value, unit, path));
    }
  }
  return sayings;
}

function saying(key: string, value: AttributeValue, unitText: string | null, of: string): Saying {
  const numbers =
    typeof value === 'number'
      ? [value]
      : typeof value === 'string'
        ? [numberIn(value)]
        : value.map((one) => (typeof one === 'number' ? one : numberIn(one)));
  const text = Array.isArray(value) ? value.join(', ') : String(value);
  const unit =
    (unitText === null ? null : parseUnit(unitText)) ??
    unitAfterNumber(text) ??
    unitInName(nameOf(key));
  const place = of === '' || of === '/' ? key : `${of}@${key}`;
  return {
    words: spaced(nameOf(key)),
    shown: `${place} = ${text}${unitText === null ? '' : ` ${unitText}`}`,
    number: Number.isFinite(numbers[0]) ? numbers[0] : Number.NaN,
    numbers,
    unit,
    text,
    of,
  };
}

/** "532.06 nm" → 532.06; a decimal comma counts when there is no point. */
function numberIn(text: string): number {
  const match = /^\s*([+-]?\d+(?:[.,]\d+)?(?:[eE][+-]?\d+)?)/.exec(text);
  return match === null ? Number.NaN : Number(match[1].replace(',', '.'));
}

function unitAfterNumber(text: string): KnownUnit | null {
  const match = /^\s*[+-]?\d+(?:[.,]\d+)?(?:[eE][+-]?\d+)?\s*([^\d\s].*?)\s*$/.exec(text);
  return match === null ? null : parseUnit(match[1]);
}
