import { describe, expect, it } from 'vitest';
import { type FakeFile, numbered, ramp } from '../fake-container';
import { guess, inspect, plain, planOf, wavelengths } from './inspect';

describe('the cube', () => {
  it('is the signal of the default NXdata group', async () => {
    const inspection = await inspect({
      groups: {
        '/': { default: 'entry' },
        '/entry': { NX_class: 'NXentry', default: 'data' },
        '/entry/other': { NX_class: 'NXdata', signal: 'big', axes: ['.', '.', 'energy'] },
        '/entry/data': { NX_class: 'NXdata', signal: 'small', axes: ['energy', 'y', 'x'] },
      },
      arrays: {
        '/entry/other/big': numbered(8, 9, 12),
        '/entry/data/small': numbered(5, 2, 3),
        '/entry/data/energy': { shape: [5], data: ramp(5, 1.9, 0.01), attributes: { units: 'eV' } },
      },
    });
    expect(guess(inspection, 'data')).toMatchObject({
      source: 'file',
      label: '/entry/data/small · 5 × 2 × 3, int32',
    });
    expect(guess(inspection, 'data').alternatives[0].choice).toEqual({ data: '/entry/other/big' });
    expect(guess(inspection, 'order').label).toBe('kyx · 5 channels × 2 rows × 3 columns');
    expect(planOf(inspection).meta.axis.centresEv[0]).toBe(1.9);
  });

  it('is told from its errors, its dark and its height map by rank and name', async () => {
    const inspection = await inspect({
      arrays: {
        '/counts_err': numbered(4, 3, 10),
        '/dark': numbered(4, 3, 10),
        '/counts': numbered(4, 3, 10),
        '/height': numbered(4, 3),
        '/wavelength': wavelengths(10),
      },
    });
    expect(planOf(inspection).cube.path).toBe('/counts');
    expect(guess(inspection, 'data').alternatives.map(({ choice }) => choice.data)).toEqual([
      '/dark',
      '/counts_err',
      '/height',
    ]);
  });

  it('may be stated, with or without the leading slash', async () => {
    const inspection = await inspect(plain, { data: 'scan/counts' });
    expect(guess(inspection, 'data').source).toBe('stated');
  });

  it('stated wrongly names the nearest arrays', async () => {
    const { problems, plan } = await inspect(plain, { data: '/scan/count' });
    expect(plan).toBeNull();
    expect(problems[0]).toMatchObject({
      kind: 'recipe',
      what: 'scan.h5 has no array called /scan/count',
      where: 'scan.data',
      hint: 'The nearest names in the file: /scan/counts.',
    });
  });

  it('of four axes, of none and of no values is refused in a sentence', async () => {
    const four = await inspect({ arrays: { '/series': numbered(2, 2, 2, 5) } });
    expect(four.problems[0].what).toBe(
      '/series · 2 × 2 × 2 × 5, int32 has 4 axes, and a scan has at most three: rows, columns, channels',
    );
    const none = await inspect({ arrays: {} });
    expect(none.problems[0].what).toBe('the file holds no numeric array');
    const empty = await inspect({ arrays: { '/counts': { shape: [4, 0, 10], data: [] } } });
    expect(empty.problems[0].what).toContain('holds no values');
    expect([four.plan, none.plan, empty.plan]).toEqual([null, null, null]);
  });

  it('may be one spectrum without a name, even one that only rises', async () => {
    const rising: FakeFile = { format: 'npy', arrays: { '': numbered(8) } };
    const { meta } = planOf(await inspect(rising, { axis: { from: 1.8, to: 2, unit: 'eV' } }));
    expect(meta.shape).toEqual({ ny: 1, nx: 1, nk: 8 });
  });

  it('without a single number is refused', async () => {
    const data = new Float64Array(40).fill(Number.NaN);
    const { problems } = await inspect({
      arrays: { '/counts': { shape: [2, 2, 10], data }, '/wavelength': wavelengths(10) },
    });
    expect(problems[0].what).toBe('the scan holds no data: every value is missing (NaN)');
  });
});
