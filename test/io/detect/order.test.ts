import { describe, expect, it } from 'vitest';
import { numbered, ramp } from '../fake-container';
import { guess, inspect, plain, planOf, wavelengths } from './inspect';

describe('the order', () => {
  it('puts channels where an axis of that length is', async () => {
    const inspection = await inspect({
      arrays: { '/counts': numbered(10, 4, 3), '/wavelength': wavelengths(10) },
    });
    expect(guess(inspection, 'order')).toMatchObject({
      label: 'kyx · 10 channels × 4 rows × 3 columns',
      source: 'guess',
    });
    expect(planOf(inspection).meta.shape).toEqual({ ny: 4, nx: 3, nk: 10 });
  });

  it('tells rows from columns by positions', async () => {
    const inspection = await inspect({
      arrays: {
        '/counts': numbered(3, 4, 10),
        '/wavelength': wavelengths(10),
        '/x': { shape: [3], data: ramp(3, 0, 2), attributes: { units: 'um' } },
        '/y': { shape: [4], data: ramp(4, 0, 3), attributes: { units: 'um' } },
      },
    });
    expect(guess(inspection, 'order')).toMatchObject({
      source: 'file',
      label: 'xyk · 3 columns × 4 rows × 10 channels',
    });
    const { meta } = planOf(inspection);
    expect([meta.x.pitch, meta.y.pitch, meta.x.unit]).toEqual([2000, 3000, 'nm']);
    expect([...(meta.y.values ?? [])]).toEqual([0, 3000, 6000, 9000]);
  });

  it('tells them by the height map where nothing else does', async () => {
    const inspection = await inspect({
      arrays: {
        '/counts': numbered(3, 4, 10),
        '/wavelength': wavelengths(10),
        '/height': numbered(4, 3),
      },
    });
    expect(guess(inspection, 'order').label).toMatch(/^xyk/);
  });

  it('says so when two axes are as long as the spectral axis', async () => {
    const inspection = await inspect({
      arrays: { '/counts': numbered(10, 4, 10), '/wavelength': wavelengths(10) },
    });
    expect(guess(inspection, 'order')).toMatchObject({
      source: 'guess',
      label: 'yxk · 10 rows × 4 columns × 10 channels',
    });
    expect(guess(inspection, 'order').evidence).toContain('axes 1 and 3 are both 10 long');
    expect(guess(inspection, 'order').alternatives.map(({ label }) => label)).toContain('kyx');
    expect(inspection.warnings).toEqual([
      'Several axes of 10 × 4 × 10 are 10 long: check that channels are axis 3.',
    ]);
  });

  it('takes pages of a TIFF for channels', async () => {
    const inspection = await inspect(
      { format: 'TIFF', arrays: { '': numbered(6, 4, 5) } },
      { axis: { from: 1.8, to: 2, unit: 'eV' } },
    );
    expect(guess(inspection, 'order').label).toMatch(/^kyx/);
    expect(planOf(inspection).resolved.data).toBeUndefined();
  });

  it('of a 2-D array is a line of spectra in one row', async () => {
    const inspection = await inspect({
      arrays: { counts: numbered(7, 10), wavelength_nm: wavelengths(10) },
    });
    expect(planOf(inspection).meta.shape).toEqual({ ny: 1, nx: 7, nk: 10 });
    expect(guess(inspection, 'order').alternatives.map(({ label }) => label)).toEqual(['yk']);
  });

  it('stated must be a permutation that fits', async () => {
    for (const order of ['yx', 'yxx', 'abc', 'yxkk', 'xk']) {
      const { problems } = await inspect(plain, { order });
      expect(problems[0]).toMatchObject({ kind: 'recipe', where: 'scan.order' });
    }
    expect(planOf(await inspect(plain, { order: 'xyk' })).meta.shape).toEqual({
      ny: 3,
      nx: 4,
      nk: 10,
    });
  });

  it('stated against the axis is told by the axis', async () => {
    const { problems } = await inspect(plain, { order: 'kyx', axis: { data: '/scan/wavelength' } });
    expect(problems[0]).toMatchObject({
      kind: 'recipe',
      what: 'the axis has 10 values, and the scan has 4 channels',
      where: 'scan.axis.data',
    });
  });
});
