import { describe, expect, it } from 'vitest';
import { numbered, ramp } from '../fake-container';
import { guess, inspect, plain, planOf, wavelengths } from './inspect';

describe('positions', () => {
  it('that are no length keep their unit and values', async () => {
    const volts = ramp(7, -6.5, 0.05);
    const inspection = await inspect({
      format: 'npz',
      arrays: {
        counts: numbered(7, 10),
        gate_volts: { shape: [7], data: volts },
        wavelength_nm: wavelengths(10),
      },
    });
    const { x, y } = planOf(inspection).meta;
    expect(x).toMatchObject({ label: 'gate_volts', unit: 'V', isLength: false, pitch: 0.05 });
    expect([...(x.values ?? [])]).toEqual([...volts]);
    expect(y).toEqual({ label: 'y', unit: 'px', isLength: false, pitch: 1, values: null });
    expect(planOf(inspection).resolved.pixel).toBeUndefined();
  });

  it('are known by their name or their long name, and are no wavelengths though in nm', async () => {
    const inspection = await inspect({
      arrays: {
        counts: numbered(4, 3, 10),
        wavelength: wavelengths(10),
        stage_y: { shape: [4], data: ramp(4, 500, 20), attributes: { units: 'nm' } },
        position: {
          shape: [3],
          data: ramp(3, 400, 15),
          attributes: { units: 'nm', long_name: 'x [nm]' },
        },
      },
    });
    const { x, y } = planOf(inspection).meta;
    expect([x.label, x.pitch, y.label, y.pitch]).toEqual(['x', 15, 'y', 20]);
    expect(guess(inspection, 'order').source).toBe('file');
    expect(guess(inspection, 'axis').alternatives).toEqual([]);
  });

  it('along a line in µm are a distance, not a wavelength', async () => {
    const inspection = await inspect({
      arrays: {
        counts: numbered(10, 10),
        wavelength: wavelengths(10),
        along: { shape: [10], data: ramp(10, 0, 0.5), attributes: { units: 'um' } },
      },
    });
    expect(planOf(inspection).meta.x).toMatchObject({ label: 'along', unit: 'nm', pitch: 500 });
    expect(guess(inspection, 'axis').alternatives).toEqual([]);
  });

  it('are read from attributes of the cube', async () => {
    const inspection = await inspect({
      arrays: {
        '/counts': {
          ...numbered(2, 3, 10),
          attributes: { pixel_size: 15, pixel_size_units: 'nm' },
        },
        '/wavelength': wavelengths(10),
      },
    });
    expect(guess(inspection, 'pixel')).toMatchObject({ label: '15 nm × 15 nm', source: 'file' });
    expect(planOf(inspection).resolved.pixel).toEqual({ x: 15, y: 15, unit: 'nm' });
  });

  it('are kept in pixels where nothing is known, in which case a unit may be stated', async () => {
    expect(guess(await inspect(plain), 'pixel')).toMatchObject({
      label: 'unknown',
      source: 'absent',
    });
    const stated = planOf(await inspect(plain, { pixel: { x: 0.1, y: 20, unit: 'um' } }));
    expect(stated.meta.x).toMatchObject({ unit: 'nm', isLength: true, pitch: 100 });
    const wrong = await inspect(plain, { pixel: { x: 0, y: 1, unit: 'nm' } });
    expect(wrong.problems[0]).toMatchObject({ kind: 'recipe', where: 'scan.pixel.x' });
  });

  it('that are scattered make a row of points, in whatever order they are named', async () => {
    const x = { shape: [3], data: [404.7, 811.9, 500.1] };
    const y = { shape: [3], data: [-427.5, -36.6, 12] };
    for (const places of [
      { x_um: x, y_um: y },
      { y_um: y, x_um: x },
    ]) {
      const rows = await inspect({
        format: 'text',
        arrays: { counts: numbered(1, 3, 10), axis: wavelengths(10), ...places },
        notes: ['The 3 points are scattered, not on a grid.'],
      });
      expect(planOf(rows).meta.shape).toEqual({ ny: 1, nx: 3, nk: 10 });
      expect(rows.warnings).toEqual(['The 3 points are scattered, not on a grid.']);
    }

    const inspection = await inspect({
      format: 'text',
      arrays: {
        counts: numbered(3, 10),
        wavelength_nm: wavelengths(10),
        x_um: { shape: [3], data: [404.7, 811.9, 500.1] },
        y_um: { shape: [3], data: [-427.5, -36.6, 12] },
      },
    });
    expect(planOf(inspection).meta.shape).toEqual({ ny: 1, nx: 3, nk: 10 });
    expect(planOf(inspection).meta.x).toMatchObject({ label: 'point', unit: 'px' });
    expect(inspection.warnings[0]).toContain('3 spectra lie at scattered positions (x_um, y_um)');
  });

  it('that are uneven are said to be', async () => {
    const inspection = await inspect({
      arrays: {
        counts: numbered(1, 4, 10),
        wavelength: wavelengths(10),
        x_um: { shape: [4], data: [0, 1, 2, 4] },
      },
    });
    expect(inspection.warnings[0]).toContain('x is not evenly spaced');
  });
});
