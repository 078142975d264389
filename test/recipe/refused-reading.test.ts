/** One thing wrong in how a recipe reads and conditions a scan. */
import { describe, expect, it } from 'vitest';
import { formatProblem, type RecipeProblem } from '../../src/recipe/problems';
import type { Spoilable } from './contract-recipe';
import { set, spoiled } from './spoiled-recipe';

describe('one thing wrong', () => {
  it.each<[string, (recipe: Spoilable) => void, Partial<RecipeProblem>]>([
    ['an unknown block', (r) => set(r, { bnads: [] }), { path: 'bnads', nearest: 'bands' }],
    [
      'an unknown field',
      (r) => set(r.bands[1], { flor: 'ends' }),
      { path: 'bands[1].flor', nearest: 'floor', value: 'ends' },
    ],
    [
      'American spelling',
      (r) => set(r.blend.channels[0], { color: '#ffffff' }),
      { path: 'blend.channels[0].color', nearest: 'colour' },
    ],
    [
      'a unit in the wrong capitals',
      (r) => set(r.bands[1], { unit: 'EV' }),
      {
        path: 'bands[1].unit',
        value: 'EV',
        nearest: 'eV',
        expected: '"eV", "meV", "nm" or "cm-1"',
      },
    ],
    [
      'a number in quotes',
      (r) => set(r.bands[0], { from: '1.865' }),
      { path: 'bands[0].from', expected: 'a number, without quotes' },
    ],
    [
      'a missing field',
      (r) => {
        Reflect.deleteProperty(r.bands[0], 'to');
      },
      { path: 'bands[0].to', value: undefined, expected: 'a number' },
    ],
    [
      'a band without width',
      (r) => set(r.bands[0], { from: 1.9, to: 1.9 }),
      { path: 'bands[0].to' },
    ],
    [
      'an energy below zero',
      (r) => set(r.bands[0], { from: -1 }),
      { path: 'bands[0].from', expected: 'a number above 0' },
    ],
    ['a name with a dot', (r) => set(r.bands[1], { name: 'A.1' }), { path: 'bands[1].name' }],
    [
      'a name taken in other capitals',
      (r) => set(r.bands[1], { name: 'TAIL' }),
      { path: 'bands[1].name' },
    ],
    [
      'a misspelled step',
      (r) => set(r.condition[0], { step: 'despyke' }),
      { path: 'condition[0].step', nearest: 'despike' },
    ],
    [
      'a threshold of zero',
      (r) => set(r.condition[0], { threshold: 0 }),
      { path: 'condition[0].threshold', expected: 'a number above 0' },
    ],
    [
      'an offset from two sources',
      (r) => set(r.condition[1], { file: 'dark.npy' }),
      { path: 'condition[1].file' },
    ],
    [
      'too few points for the degree',
      (r) => set(r.condition[3], { degree: 3 }),
      { path: 'condition[3].points', expected: 'at least 4 points for degree 3' },
    ],
    [
      'two points at one place',
      (r) =>
        set(r.condition[3], {
          points: [
            [1, 2],
            [1, 3],
          ],
        }),
      { path: 'condition[3].points[1][0]' },
    ],
    [
      'a point that is no pair',
      (r) =>
        set(r.condition[3], {
          points: [
            [1, 2, 3],
            [2, 2],
          ],
        }),
      { path: 'condition[3].points[0]' },
    ],
    [
      'a misspelled word beside numbers',
      (r) => set(r.condition[6], { rank: 'atuo' }),
      { path: 'condition[6].rank', nearest: 'auto' },
    ],
    [
      'a half pixel',
      (r) => set(r.condition[8], { x: [0, 9.5] }),
      { path: 'condition[8].x[1]', expected: 'a whole number' },
    ],
    [
      'an empty bin',
      (r) => {
        (r.condition as unknown[])[9] = { step: 'bin' };
      },
      { path: 'condition[9].k' },
    ],
    [
      'an axis from two sources',
      (r) => set(r.scan.axis, { file: 'axis.npy' }),
      { path: 'scan.axis.file' },
    ],
    ['half a uniform axis', (r) => set(r.scan, { axis: { from: 1 } }), { path: 'scan.axis.to' }],
    [
      'a unit that does not fit the kind',
      (r) => set(r.scan.axis, { unit: 'eV' }),
      { path: 'scan.axis.unit' },
    ],
    ['an axis twice in the order', (r) => set(r.scan, { order: 'yyk' }), { path: 'scan.order' }],
    [
      'a unit under another spelling',
      (r) => set(r.scan.pixel, { unit: 'µm' }),
      { path: 'scan.pixel.unit', nearest: 'um' },
    ],
    ['a pitch of zero', (r) => set(r.scan.pixel, { x: 0 }), { path: 'scan.pixel.x' }],
    [
      'a list one too short',
      (r) => set(r.scan.height, { shift_px: [1] }),
      { path: 'scan.height.shift_px' },
    ],
    [
      'bounds the wrong way round',
      (r) => set(r.model.components[1].centre, { min: 2.1 }),
      { path: 'model.components[1].centre.max' },
    ],
    [
      'a start out of its bounds',
      (r) => set(r.model.components[1].centre, { start: 2.5 }),
      { path: 'model.components[1].centre.start', expected: 'a number from 1.97 to 2.04' },
    ],
    [
      'a fixed value that is not given',
      (r) => set(r.model.components[1], { fwhm: { fixed: true } }),
      { path: 'model.components[1].fwhm.start' },
    ],
    [
      'a width below zero',
      (r) => set(r.model.components[2], { fwhm: -0.05 }),
      { path: 'model.components[2].fwhm' },
    ],
  ])('is told of %s, and nothing else', (_, change, expected) => {
    const told = spoiled(change);
    expect(told.map(formatProblem)).toHaveLength(1);
    expect(told[0]).toMatchObject(expected);
  });
});
