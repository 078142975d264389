/** A digest of the bits of every shape, for the test in Node and the same test in the browser. */
import { gridOf } from '../../../src/science/peaks/shape';
import { shapeByName, shapeNames } from '../../../src/science/peaks/shape-by-name';

const count = 96;
const edgesEv = Float64Array.from({ length: count + 1 }, (_, k) => 1.8 + k * (0.25 / count));
const centresEv = edgesEv.slice(1).map((high, k) => 0.5 * (high + (edgesEv[k] as number)));
const grid = gridOf({ centresEv, edgesEv }, 0, count);

/** From narrower than a channel to wider than the window; so that every formula of each shape is used. */
const widthsEv = [0, 1e-5, 0.0007, 0.003, 0.02, 0.09, 0.6];
const centres = [1.75, 1.9001, 1.95];
const plain = [-7, -0.3, 0, 0.4, 1, 25];

function valuesOf(unit: string, name: string): readonly number[] {
  if (name === 'area') return [1234.5];
  if (name === 'centre') return centres;
  if (name === 'decay') return [-0.3, 0.07, 2];
  if (unit === 'eV') return widthsEv;
  return unit === '1' ? plain : [-20, 3.25];
}

/** Every value of each parameter with every other. */
function combinations(name: string): number[][] {
  let rows: number[][] = [[]];
  for (const { unit, name: parameter } of shapeByName(name).parameters) {
    rows = rows.flatMap((row) => valuesOf(unit, parameter).map((value) => [...row, value]));
  }
  return rows;
}

/** FNV-1a of the bits of counts and derivatives. */
function digestOf(name: string): string {
  const shape = shapeByName(name);
  let a = 0x811c9dc5;
  let b = 0x1000193;
  for (const row of combinations(name)) {
    const counts = new Float64Array(count);
    const columns = shape.parameters.map(() => new Float64Array(count));
    shape.evaluate(grid, Float64Array.from(row), counts, columns);
    for (const array of [counts, ...columns]) {
      // +0 and −0 alike, and every NaN
      const words = new Uint32Array(
        array.map((value) => (Number.isNaN(value) ? 1e300 : value + 0)).buffer,
      );
      for (let i = 0; i < words.length; i += 2) {
        a = Math.imul(a ^ (words[i] as number), 0x01000193);
        b = Math.imul(b ^ (words[i + 1] as number), 0x01000193);
        a ^= b >>> 15;
        b ^= a >>> 13;
      }
    }
  }
  return [a, b].map((word) => (word >>> 0).toString(16).padStart(8, '0')).join('');
}

/** `name digest` of each shape, one a line, so that a failing comparison names the shape. */
export function shapeBitsDigest(): string {
  return shapeNames.map((name) => `${name} ${digestOf(name)}`).join('\n');
}

/** What `shapeBitsDigest` gives where the arithmetic is that of IEEE 754. */
export const pinnedShapeBits = [
  'gaussian 64410e0b5c1edde1',
  'lorentzian 99007765b1e4810c',
  'pseudo-voigt ce458a1d29215977',
  'voigt 9b1174b8830b4815',
  'tailed 4c7ae052b7bb7a2b',
  'fano fdf2aad49afe1faa',
  'flat 2ad38fdfd14581e8',
  'line bbd1e499fc696514',
  'parabola 1db9cb57ba1e829f',
  'decay 690415d0ae0029ec',
].join('\n');
