import { describe, expect, it } from 'vitest';
import type { Companion } from '../../../src/io/scan-plan';
import { type FakeFile, fakeContainer, numbered, ramp } from '../fake-container';
import { guess, inspect, plain, planOf } from './inspect';

describe('the spectral axis', () => {
  const both: FakeFile = {
    arrays: {
      '/scan/absorbance': { shape: [2, 3, 5], data: ramp(30, 0, 0.01) },
      '/scan/energy': {
        shape: [5],
        data: ramp(5, 600, 100).map((cm1) => cm1 * 1.239841984e-4),
        attributes: { units: 'eV' },
      },
      '/scan/wavenumber': { shape: [5], data: ramp(5, 600, 100), attributes: { units: 'cm^-1' } },
    },
  };

  it('of two that fit is chosen with a reason, the other offered with its own kind and unit', async () => {
    const inspection = await inspect(both);
    expect(guess(inspection, 'axis')).toMatchObject({
      label: '/scan/wavenumber · 600 – 1000, 5 values',
      source: 'guess',
      alternatives: [
        {
          label: '/scan/energy',
          choice: { axis: { data: '/scan/energy', kind: 'energy', unit: 'eV' } },
        },
      ],
    });
    expect(guess(inspection, 'kind')).toMatchObject({ label: 'photon energy', source: 'file' });
    expect(guess(inspection, 'kind').evidence).toContain(
      'the same light as /scan/energy, so absolute',
    );
    const { alternatives } = guess(inspection, 'axis');
    const other = planOf(await inspect(both, alternatives[0].choice));
    const own = planOf(inspection);
    for (let k = 0; k < 5; k++) {
      expect(other.meta.axis.centresEv[k]).toBeCloseTo(own.meta.axis.centresEv[k], 9);
    }
    expect(own.meta.quantity).toBe('absorbance');
    expect(guess(inspection, 'noise')).toMatchObject({
      label: 'none',
      evidence: 'absorbance is a ratio, not counts',
    });
  });

  it('in wavenumbers alone is absolute for absorbance and a Raman shift for emission', async () => {
    const wavenumber = { shape: [5], data: ramp(5, 600, 100), attributes: { units: '1/cm' } };
    const absorbing = await inspect({
      arrays: { absorbance: { shape: [2, 3, 5], data: ramp(30, 0, 0.01) }, wavenumber },
    });
    expect(guess(absorbing, 'kind')).toMatchObject({ label: 'photon energy', source: 'guess' });
    const emitting = await inspect({ arrays: { counts: numbered(2, 3, 5), wavenumber } });
    expect(guess(emitting, 'kind')).toMatchObject({ label: 'Raman shift', source: 'guess' });
    expect(emitting.problems[0].what).toBe(
      'the axis is a Raman shift, and the laser is not stated',
    );
    expect(emitting.problems[0].hint).toContain('scan.laser');
    const green = { ...wavenumber, data: ramp(5, 16_000, 100) };
    const visible = await inspect({ arrays: { counts: numbered(2, 3, 5), wavenumber: green } });
    expect(guess(visible, 'kind').label).toBe('photon energy');
  });

  it('without name or unit is believed only where its numbers fit one scale', async () => {
    const named = (first: number, step: number) =>
      inspect({
        arrays: { counts: numbered(2, 3, 5), axis: { shape: [5], data: ramp(5, first, step) } },
      });
    expect(guess(await named(700, 10.5), 'kind').label).toBe('wavelength');
    expect(guess(await named(1.8, 0.01), 'kind').label).toBe('photon energy');
    expect(guess(await named(-20, 100.5), 'kind').label).toBe('Raman shift');
    const either = await named(1010, 150);
    expect(either.plan).toBeNull();
    expect(guess(either, 'kind').source).toBe('missing');
    expect(guess(either, 'kind').alternatives.map(({ choice }) => choice.axis)).toEqual([
      { kind: 'wavelength', unit: 'nm' },
      { kind: 'energy', unit: 'eV' },
      { kind: 'shift', unit: 'cm-1' },
    ]);
    expect(either.problems[0].what).toContain('1010 to 1610, is not stated');
  });

  it('that counts pixels is refused with how to give another', async () => {
    const { problems } = await inspect({
      format: 'text',
      arrays: {
        Pixel: { shape: [8], data: ramp(8, 0, 1) },
        Intensity: { shape: [8], data: ramp(8, 3.5, 1) },
      },
    });
    expect(problems[0].what).toBe(
      'the only axis, Pixel, counts detector pixels and carries no wavelength',
    );
    expect(problems[0].hint).toContain('a file of 8 values');
  });

  it('called a pixel but running through zero in fractions is a Raman shift', async () => {
    const file: FakeFile = {
      format: 'text',
      arrays: {
        Pixel: { shape: [8], data: ramp(8, -601.28, 700.3) },
        Intensity: { shape: [8], data: ramp(8, 3, 1) },
      },
    };
    const inspection = await inspect(file, { laser: { value: 532, unit: 'nm' } });
    expect(guess(inspection, 'kind').label).toBe('Raman shift');
    expect(guess(inspection, 'kind').evidence).toContain('not a pixel number');
    expect(planOf(inspection).meta.shape).toEqual({ ny: 1, nx: 1, nk: 8 });
  });

  it('leaves out channels without a value and says how many', async () => {
    const data = ramp(10, 600, 0.5);
    data[8] = Number.NaN;
    data[9] = Number.NaN;
    const inspection = await inspect({
      arrays: {
        counts: numbered(2, 3, 10),
        wavelength: { shape: [10], data, attributes: { units: 'nm' } },
      },
    });
    expect(planOf(inspection).meta.shape.nk).toBe(8);
    expect([...planOf(inspection).cube.channels]).toEqual([7, 6, 5, 4, 3, 2, 1, 0]);
    expect(inspection.warnings).toEqual(['2 of 10 channels have no axis value and are left out.']);
  });

  it('that turns back is refused, not passed over', async () => {
    const { problems } = await inspect({
      arrays: {
        counts: numbered(2, 3, 4),
        wavelength_nm: { shape: [4], data: Float64Array.of(600, 601, 600.5, 602) },
      },
    });
    expect(problems[0].what).toContain('ascends and then falls: 601 at channel 1');
    expect(problems[0].where).toBe('scan.h5 · wavelength_nm');
  });

  it('may be given by values, by its ends, by a companion or by name, but only once', async () => {
    const bare: FakeFile = { format: 'npy', arrays: { '': numbered(2, 3, 5) } };
    const missing = await inspect(bare);
    expect(missing.problems[0].what).toBe('no spectral axis with 5 values was found');

    const listed = await inspect(bare, { axis: { values: [1.8, 1.9, 2, 2.1, 2.2], unit: 'eV' } });
    expect([...planOf(listed).meta.axis.centresEv]).toEqual([1.8, 1.9, 2, 2.1, 2.2]);
    const uniform = await inspect(bare, {
      axis: { from: 2.2, to: 1.8, kind: 'energy', unit: 'eV' },
    });
    expect([...planOf(uniform).cube.channels]).toEqual([4, 3, 2, 1, 0]);
    const axisFile: Companion = {
      name: 'axis.csv',
      container: fakeContainer({
        format: 'text',
        arrays: { wavelength_nm: { shape: [5], data: ramp(5, 600, 1) } },
      }),
    };
    const found = await inspect(bare, {}, [axisFile]);
    expect(guess(found, 'axis')).toMatchObject({
      source: 'guess',
      label: 'axis.csv · 600 – 604, 5 values',
    });
    expect(guess(found, 'axis').evidence).toContain('axis.csv was given with the scan and fits');
    expect(planOf(found).resolved.axis).toEqual({
      file: 'axis.csv',
      kind: 'wavelength',
      unit: 'nm',
      medium: 'air',
    });
    const stated = await inspect(bare, { axis: { file: 'calibration/axis.csv' } }, [axisFile]);
    expect(guess(stated, 'axis').source).toBe('stated');

    const twice = await inspect(bare, { axis: { values: [1, 2], file: 'axis.csv' } }, [axisFile]);
    expect(twice.problems[0].what).toBe('the axis is given twice, by values and by file');
    const half = await inspect(bare, { axis: { from: 1.8 } });
    expect(half.problems[0].what).toBe('a uniform axis needs both its ends, from and to');
    const absent = await inspect(bare, { axis: { file: 'axes.csv' } }, [axisFile]);
    expect(absent.problems[0]).toMatchObject({ kind: 'recipe', where: 'scan.axis.file' });
    expect(absent.problems[0].hint).toContain('axis.csv');
    const short = await inspect(bare, { axis: { values: [1.8, 1.9, 2, 2.1], unit: 'eV' } });
    expect(short.problems[0].what).toBe('the axis has 4 values, and the scan has 5 channels');
    const unknown = await inspect(plain, { axis: { data: '/scan/wavelenght' } });
    expect(unknown.problems[0].hint).toContain('/scan/wavelength');
  });

  it('has a unit that goes with its kind', async () => {
    const wrong = await inspect(plain, { axis: { kind: 'energy', unit: 'nm' } });
    expect(wrong.problems[0]).toMatchObject({ kind: 'recipe', where: 'scan.axis.unit' });
    const odd = await inspect(plain, { axis: { unit: 'furlong' } });
    expect(odd.problems[0].what).toBe('“furlong” is no unit of a spectral axis');
  });
});
