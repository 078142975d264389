import { describe, expect, it } from 'vitest';
import { cm1FromEv, nmFromEv } from '../../../src/science/units';
import { type FakeFile, numbered, ramp } from '../fake-container';
import { guess, inspect, plain, planOf } from './inspect';

describe('medium and laser', () => {
  it('air is the guess for wavelengths, vacuum the alternative', async () => {
    const inspection = await inspect(plain);
    expect(guess(inspection, 'medium')).toMatchObject({ label: 'air', source: 'guess' });
    expect(guess(inspection, 'medium').evidence).toContain('common practice');
    expect(guess(inspection, 'medium').alternatives[0].choice).toEqual({
      axis: { medium: 'vacuum' },
    });
    const vacuum = planOf(await inspect(plain, { axis: { medium: 'vacuum' } }));
    const air = planOf(inspection);
    // 600 nm: n − 1 = 2.77e-4 (Ciddor 1996)
    expect(vacuum.meta.axis.centresEv[9] / air.meta.axis.centresEv[9] - 1).toBeCloseTo(2.77e-4, 6);
  });

  it('is believed where the file says it', async () => {
    const inspection = await inspect({
      arrays: {
        counts: numbered(2, 3, 5),
        wavelength_vacuum_nm: { shape: [5], data: ramp(5, 600, 1) },
      },
    });
    expect(guess(inspection, 'medium')).toMatchObject({ label: 'vacuum', source: 'file' });
  });

  it('the laser is the sum of wavenumber and shift, which prefers the shift', async () => {
    const wavenumber = ramp(30, 18_840.39, -3.06);
    const inspection = await inspect({
      format: 'text',
      arrays: {
        pixel: { shape: [30], data: ramp(30, 0, 1) },
        wavelength_nm: { shape: [30], data: wavenumber.map((cm1) => Math.round(1e9 / cm1) / 100) },
        wavenumber_cm1: { shape: [30], data: wavenumber },
        raman_shift_cm1: { shape: [30], data: wavenumber.map((cm1) => 18_792.04 - cm1) },
        dark_counts: numbered(30),
        raw_counts: { shape: [30], data: ramp(30, 1000, 3) },
        raw_minus_dark: { shape: [30], data: ramp(30, -7, 1) },
      },
    });
    expect(guess(inspection, 'laser')).toMatchObject({
      source: 'file',
      label: '532.14 nm in vacuum (18792.04 cm⁻¹)',
      evidence: 'wavenumber_cm1 + raman_shift_cm1 is 18792.04 cm⁻¹ at every channel',
    });
    expect(guess(inspection, 'axis').label).toMatch(/^raman_shift_cm1/);
    expect(guess(inspection, 'axis').alternatives.map(({ label }) => label)).toEqual([
      'wavelength_nm',
      'wavenumber_cm1',
    ]);
    expect(guess(inspection, 'data').label).toMatch(/^raw_counts/);
    expect(guess(inspection, 'data').alternatives.map(({ choice }) => choice.data)).toEqual([
      'raw_minus_dark',
      'dark_counts',
    ]);
    const { meta } = planOf(inspection);
    expect(cm1FromEv(meta.laserEv ?? 0)).toBeCloseTo(18_792.04, 6);
    expect(cm1FromEv(meta.axis.centresEv[29])).toBeCloseTo(18_840.39, 6);
    expect(meta.noise.kind).toBe('poisson');
    const wavelength = await inspect(
      { format: 'text', arrays: fileOf(wavenumber).arrays },
      { axis: { data: 'wavelength_nm' } },
    );
    expect(guess(wavelength, 'medium')).toMatchObject({ label: 'vacuum', source: 'file' });
  });

  function fileOf(wavenumber: Float64Array): FakeFile {
    return {
      arrays: {
        wavelength_nm: { shape: [30], data: wavenumber.map((cm1) => Math.round(1e9 / cm1) / 100) },
        wavenumber_cm1: { shape: [30], data: wavenumber },
        counts: { shape: [30], data: ramp(30, 1000, 3) },
      },
    };
  }

  it('is told by wavelength and shift together, and the medium with it', async () => {
    const wavelength = ramp(200, 799.84, 1.5);
    const shift = wavelength.map((nm) => Math.round((1e7 / 785.041 - 1e7 / nm) * 100) / 100);
    const inspection = await inspect({
      format: 'text',
      arrays: {
        wavelength_nm: { shape: [200], data: wavelength },
        raman_shift_cm1: { shape: [200], data: shift },
        counts: { shape: [200], data: ramp(200, 5.5, 1) },
      },
    });
    expect(guess(inspection, 'laser').label).toContain('785.04 nm in vacuum');
    expect(guess(inspection, 'laser').evidence).toContain('wavelengths in vacuum');
  });

  it('is found among attributes and facts, with the unit they carry', async () => {
    const shift = { shape: [5], data: ramp(5, 100, 10), attributes: { units: 'cm-1' } };
    const laserOf = async (file: Partial<FakeFile>) => {
      const inspection = await inspect({
        ...file,
        arrays: { counts: numbered(2, 2, 5), raman_shift: shift, ...file.arrays },
      });
      return nmFromEv(planOf(inspection).meta.laserEv ?? 0);
    };
    expect(
      await laserOf({ facts: { laser: '532.06 nm', laser_power_mW: 5 }, arrays: {} }),
    ).toBeCloseTo(532.208, 2);
    expect(await laserOf({ groups: { '/': { laser_ev: 2.33 } }, arrays: {} })).toBeCloseTo(
      532.121,
      3,
    );
    expect(
      await laserOf({
        arrays: {
          '/instrument/laser_wavelength': { shape: [], data: [632.8], attributes: { units: 'nm' } },
        },
      }),
    ).toBeCloseTo(632.975, 2);
  });

  it('is read from the file’s name only where a shift needs it, and said so', async () => {
    const shift: FakeFile = {
      format: 'text',
      arrays: { raman_shift_cm1: { shape: [5], data: ramp(5, 100, 10) }, counts: numbered(5) },
    };
    const needed = await inspect(shift, {}, [], 'B_785nm_algae.csv');
    expect(guess(needed, 'laser')).toMatchObject({ source: 'guess', label: '785 nm' });
    expect(guess(needed, 'laser').evidence).toContain('nothing inside the file states the laser');
    const unneeded = await inspect(plain, {}, [], 'pillars_532nm.h5');
    expect(guess(unneeded, 'laser')).toMatchObject({ source: 'absent', label: 'unknown' });
    const pitch = await inspect(shift, {}, [], 'pillars_450nm.csv');
    expect(pitch.problems[0].what).toContain('the laser is not stated');
  });

  it('in nm is read in the medium of the axis', async () => {
    const laser = { value: 632.816, unit: 'nm' } as const;
    const air = planOf(await inspect(plain, { laser }));
    expect(nmFromEv(air.meta.laserEv ?? 0)).toBeCloseTo(632.991, 3);
    const vacuum = planOf(await inspect(plain, { laser, axis: { medium: 'vacuum' } }));
    expect(nmFromEv(vacuum.meta.laserEv ?? 0)).toBeCloseTo(632.816, 9);
  });

  it('that cannot be is refused', async () => {
    const { problems } = await inspect(plain, { laser: { value: 532, unit: 'eV' } });
    expect(problems[0]).toMatchObject({ kind: 'recipe', where: 'scan.laser' });
  });
});
