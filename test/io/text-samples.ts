/** Small valid text and JCAMP-DX files, one of each layout, for checks that hold for every reader. */
import { jcampReader } from '../../src/io/jcamp/jcamp-reader';
import { textReader } from '../../src/io/text/text-reader';
import type { ReaderCase } from './check-reader';

const text = (name: string, lines: readonly string[], end = '\n'): ReaderCase => ({
  name,
  bytes: new TextEncoder().encode(lines.map((line) => line + end).join('')),
  reader: textReader,
});

const jcamp = (name: string, lines: readonly string[]): ReaderCase => ({
  ...text(name, lines, '\r\n'),
  reader: jcampReader,
});

const pixels = [0, 1, 2].flatMap((y) => [0, 1, 2, 3].map((x) => [x, y] as const));
const countOf = (x: number, y: number, k: number): number => (97 * x + 31 * y + 13 * k * k) % 300;
const channels = [0, 1, 2, 3, 4];

const utf16 = (file: ReaderCase): ReaderCase => {
  const units = Uint16Array.from(`\ufeff${new TextDecoder().decode(file.bytes)}`, (sign) =>
    sign.charCodeAt(0),
  );
  return { ...file, bytes: new Uint8Array(units.buffer) };
};

const headers = (kind: string, points: number, form: string): readonly string[] => [
  '##TITLE= sample $$ of the tests',
  '##JCAMP-DX= 4.24',
  `##DATA TYPE= ${kind}`,
  '##ORIGIN= test',
  '##OWNER= public domain',
  '##$LASER= 532 nm',
  '##XUNITS= 1/CM',
  '##YUNITS= COUNTS',
  '##XFACTOR= 1',
  '##YFACTOR= 1',
  '##FIRSTX= 100',
  `##LASTX= ${100 + 2 * (points - 1)}`,
  `##NPOINTS= ${points}`,
  form,
];

export const textSamples: readonly ReaderCase[] = [
  text('pixel-rows.csv', [
    '# laser: 532 nm',
    `x_um,y_um,${channels.map((k) => 600 + k / 2).join(',')}`,
    ...pixels.map(([x, y]) => [x, y, ...channels.map((k) => countOf(x, y, k))].join(',')),
  ]),
  text(
    'decimal-comma.txt',
    [
      'Exposure: 0,5 s',
      'x (µm);y (µm);600,5;601,5;602,5',
      ...pixels.map(([x, y]) => `${x},25;${y},5;${x},125;${y},0;-1,5e-2`),
    ],
    '\r\n',
  ),
  text('long.tsv', [
    'x\ty\traman_shift_cm1\tcounts',
    ...pixels.flatMap(([x, y]) =>
      channels.map((k) => [x, y, 520 - k, countOf(x, y, k)].join('\t')),
    ),
  ]),
  text('spectrum.csv', [
    '"pixel","Wavelength (nm)","counts"',
    ...channels.map((k) => `${k},${k > 3 ? '' : 600 + k},${k === 1 ? 'NA' : countOf(k, 0, k)}`),
  ]),
  text('line.dat', [
    'gate_volts  600  601  602',
    ...channels.map((k) => `  ${k / 10}  ${countOf(k, 1, 1)}  ${countOf(k, 2, 2)}  7`),
  ]),
  text('points.csv', [
    'x,y,height_nm',
    ...pixels.map(([x, y]) => `${x},${y},${countOf(x, y, 1) / 8}`),
  ]),
  text(
    'matrix.txt',
    channels.map((k) => Array.from({ length: 14 }, (_, x) => countOf(x, k, 2)).join(' ')),
  ),
  utf16(text('wide.txt', ['a\tb', '1\t2', '3\t4,5', '5\t6'], '\r\n')),
  jcamp('differences.jdx', [
    ...headers('RAMAN SPECTRUM', 12, '##XYDATA= (X++(Y..Y))'),
    '100A0J2%Tj5',
    '108@7K3S%?B2J1Ta',
    '##END= $$ sample',
  ]),
  jcamp('pairs.dx', [
    ...headers('RAMAN SPECTRUM', 3, '##XYPOINTS= (XY..XY)'),
    '100, 5; 102, 7.5',
    '104, ?',
    '##END=',
  ]),
  jcamp('linked.jdx', [
    '##TITLE= two',
    '##JCAMP-DX= 5.00',
    '##DATA TYPE= LINK',
    '##BLOCKS= 2',
    ...headers('INFRARED SPECTRUM', 4, '##XYDATA= (X++(Y..Y))'),
    '100 1 -2 3 4.5E+1',
    '##END=',
    ...headers('INFRARED SPECTRUM', 4, '##XYDATA= (X++(Y..Y))'),
    '100+1-2+3+4',
    '##END=',
    '##END=',
  ]),
];
