/** What the labels of a block say about its spectrum: units, names, and facts such as a laser. */
import type { AttributeValue } from '../container';
import { parseUnit } from '../detect/words';
import { type JcampBlock, type JcampRecord, numberOf, recordOf, textOf } from './records';

type Attributes = Readonly<Record<string, AttributeValue>>;

/**
 * XUNITS as found, and XLABEL. In a Raman spectrum 1/CM counts from the laser line (common practice,
 * no source), so the name says Raman shift.
 */
export function xAttributes(block: JcampBlock): Attributes {
  const units = textOf(block, 'XUNITS');
  const isRaman = /RAMAN/i.test(textOf(block, 'DATATYPE')) && parseUnit(units) === 'cm-1';
  const label = textOf(block, 'XLABEL');
  return attributes(units, label === '' && isRaman ? 'Raman shift' : label);
}

/** YUNITS as found, and YLABEL; the unit is the name where there is no label ("ABSORBANCE"). */
export function yAttributes(block: JcampBlock): Attributes {
  const units = textOf(block, 'YUNITS');
  return attributes(units, textOf(block, 'YLABEL') || units);
}

function attributes(units: string, name: string): Attributes {
  return {
    ...(units === '' ? {} : { units }),
    ...(name === '' ? {} : { long_name: name }),
  };
}

/** Labels that describe the table and not the measurement. */
const tableLabels: ReadonlySet<string> = new Set([
  'XYDATA',
  'XYPOINTS',
  'PEAKTABLE',
  'PEAKASSIGNMENTS',
  'DATATABLE',
  'RADATA',
  'XUNITS',
  'YUNITS',
  'XLABEL',
  'YLABEL',
  'XFACTOR',
  'YFACTOR',
  'FIRSTX',
  'LASTX',
  'DELTAX',
  'NPOINTS',
  'FIRSTY',
  'MAXX',
  'MINX',
  'MAXY',
  'MINY',
  'BLOCKS',
]);

const longestFact = 500;

/**
 * What the first spectrum's labels state, then those of the block that links it; a user's own label
 * (##$LASER=) or one of a technique (##.LASER=) without its mark.
 */
export function factsOf(
  blocks: readonly JcampBlock[],
  spectrum: JcampBlock,
): Readonly<Record<string, string | number>> {
  const link = blocks.find((block) => /^LINK/i.test(textOf(block, 'DATATYPE')));
  const facts = new Map<string, string | number>();
  for (const block of link === undefined || link === spectrum ? [spectrum] : [spectrum, link]) {
    for (const record of block.records) {
      const key = record.name.replace(/^[$.]\s*/, '').trim();
      const value = factValue(block, record);
      if (key === '' || value === '' || tableLabels.has(record.label) || facts.has(key)) continue;
      facts.set(key, value);
    }
  }
  return Object.fromEntries(facts);
}

function factValue(block: JcampBlock, record: JcampRecord): string | number {
  const text = [record.value, ...record.lines.map((line) => line.text)].join(' ');
  const plain = text.replace(/\s+/g, ' ').trim().slice(0, longestFact);
  const number = numberOf(block, record.label);
  const isNumber = /^[+-]?[\d.]+(?:[eE][+-]?\d+)?$/.test(plain);
  return isNumber && number !== null && recordOf(block, record.label) === record ? number : plain;
}
