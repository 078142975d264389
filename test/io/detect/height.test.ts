import { describe, expect, it } from 'vitest';
import type { Companion } from '../../../src/io/scan-plan';
import { type FakeFile, fakeContainer, numbered } from '../fake-container';
import { guess, inspect, plain, planOf, wavelengths } from './inspect';

describe('the height map', () => {
  it('inside the file is told by name and shape, with its unit', async () => {
    const file: FakeFile = {
      arrays: {
        '/counts': numbered(4, 3, 10),
        '/wavelength': wavelengths(10),
        '/topography': { ...numbered(4, 3), attributes: { units: 'm' } },
      },
    };
    const inspection = await inspect(file);
    expect(planOf(inspection).height).toEqual({
      file: null,
      path: '/topography',
      unitNm: 1e9,
      shiftPx: [0, 0],
    });
    expect(guess(inspection, 'height').source).toBe('file');
    const stated = await inspect(file, {
      height: { data: '/topography', unit: 'um', shift_px: [1, -0.5] },
    });
    expect(planOf(stated).height).toEqual({
      file: null,
      path: '/topography',
      unitNm: 1000,
      shiftPx: [1, -0.5],
    });
  });

  it('beside the file is used where it fits, and said so', async () => {
    const companion = (shape: readonly number[], name = 'height.npy'): Companion => ({
      name,
      container: fakeContainer({ format: 'npy', arrays: { '': numbered(...shape) } }),
    });
    const inspection = await inspect(plain, {}, [companion([4, 3])]);
    expect(planOf(inspection).height).toMatchObject({ file: 'height.npy', path: '', unitNm: 1 });
    expect(guess(inspection, 'height')).toMatchObject({ source: 'guess' });
    expect(guess(inspection, 'height').evidence).toContain('unit is not stated');
    expect(guess(await inspect(plain, {}, [companion([5, 3])]), 'height').source).toBe('absent');
    expect(
      guess(await inspect(plain, {}, [companion([4, 3], 'dark_map.npy')]), 'height').source,
    ).toBe('absent');
    const turned = await inspect(plain, {}, [companion([3, 4])]);
    expect(turned.warnings).toEqual([
      'The height map height.npy is kept as columns × rows and is turned.',
    ]);
  });

  it('stated wrongly is refused', async () => {
    const wrong = await inspect(plain, { height: { data: '/scan/wavelength' } });
    expect(wrong.problems[0]).toMatchObject({ kind: 'recipe', where: 'scan.height.data' });
    expect(wrong.problems[0].what).toContain('the scan has 4 rows of 3 pixels');
    const absent = await inspect(plain, { height: { file: 'height.npy' } });
    expect(absent.problems[0].what).toBe('the file height.npy was not given with the scan');
  });
});
