/** A small JCAMP-DX file for tests, with what is wrong or unusual put in. */
import { memorySource } from '../../../src/io/byte-source';
import type { Container } from '../../../src/io/container';
import { jcampReader } from '../../../src/io/jcamp/jcamp-reader';
import { expectScanError, outcomeOf } from '../check-reader';

export const open = (lines: readonly string[], end = '\r\n'): Promise<Container> =>
  jcampReader.open(memorySource('a.jdx', new TextEncoder().encode(lines.join(end) + end)));

export async function values(file: Container, path: string): Promise<number[]> {
  const entry = file.entries.find((one) => one.path === path);
  if (entry === undefined) throw new Error(`no ${path}`);
  return Array.from(await file.read(path, [0], entry.shape));
}

export async function refusal(lines: readonly string[]) {
  const { error } = await outcomeOf(() => open(lines));
  expectScanError(error);
  return error;
}

type Header = Readonly<Record<string, string | number | null>>;

/** A file of four points, 1, 2, 3, 4 at 100, 102, 104, 106, with some labels changed (null: taken out). */
export function fileOf(
  changes: Header = {},
  table: readonly string[] = ['100 1 2', '104 3 4'],
  form = '##XYDATA= (X++(Y..Y))',
): string[] {
  const labels: Header = {
    TITLE: 'four points',
    'JCAMP-DX': '4.24',
    'DATA TYPE': 'INFRARED SPECTRUM',
    ORIGIN: 'test',
    OWNER: 'public domain',
    XUNITS: '1/CM',
    YUNITS: 'ABSORBANCE',
    XFACTOR: 1,
    YFACTOR: 1,
    FIRSTX: 100,
    LASTX: 106,
    NPOINTS: 4,
    FIRSTY: 1,
    ...changes,
  };
  const header = Object.entries(labels)
    .filter(([, value]) => value !== null)
    .map(([label, value]) => `##${label}= ${value}`);
  return [...header, form, ...table, '##END='];
}
