import { describe, expect, it } from 'vitest';
import { detectScan } from '../../../src/io/detect/detect-scan';
import type { ScanChoices } from '../../../src/io/scan-choices';
import type { Companion, Guess, GuessField, Inspection } from '../../../src/io/scan-plan';
import { cm1FromEv, nmFromEv } from '../../../src/science/units';
import { type FakeFile, fakeContainer, numbered, ramp } from '../fake-container';

const inspect = (
  file: FakeFile,
  choices: ScanChoices = {},
  companions: readonly Companion[] = [],
  name = 'scan.h5',
): Promise<Inspection> => detectScan(fakeContainer(file), companions, choices, name);

function guess(inspection: Inspection, field: GuessField): Guess {
  const found = inspection.guesses.find((one) => one.field === field);
  if (found === undefined)
    throw new Error(`no guess of ${field}: ${inspection.problems.map(String).join('; ')}`);
  return found;
}

function planOf(inspection: Inspection) {
  if (inspection.plan === null) throw new Error(inspection.problems.map(String).join('; '));
  return inspection.plan;
}

const wavelengths = (length: number) => ({
  shape: [length],
  data: ramp(length, 600, 0.5),
  attributes: { units: 'nm' },
});

const plain: FakeFile = {
  arrays: { '/scan/counts': numbered(4, 3, 10), '/scan/wavelength': wavelengths(10) },
};

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
      { format: 'text', arrays: (await Promise.resolve(fileOf(wavenumber))).arrays },
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

describe('noise, exposure and serpentine rows', () => {
  const withCounts = (data: Float64Array | Int16Array): FakeFile => ({
    arrays: { counts: { shape: [2, 2, 10], data }, wavelength_nm: wavelengths(10) },
  });

  it('whole numbers from zero up are Poisson counts, also in floating point', async () => {
    expect(planOf(await inspect(withCounts(ramp(40, 0, 1)))).meta.noise).toEqual({
      kind: 'poisson',
    });
  });

  it('negative and fractional values have no noise model, for a stated reason', async () => {
    const negative = await inspect(withCounts(Int16Array.from(ramp(40, -28, 1))));
    expect(guess(negative, 'noise').evidence).toContain('negative values down to -28');
    const fractional = await inspect(withCounts(ramp(40, 0, 0.5)));
    expect(guess(fractional, 'noise').evidence).toContain('not whole numbers');
    expect(planOf(fractional).meta.noise).toEqual({ kind: 'none' });
  });

  it('a detector block is the noise model, its defaults filled in', async () => {
    const { meta, resolved } = planOf(
      await inspect(withCounts(ramp(40, 0, 0.5)), { detector: { read_noise_e: 5 } }),
    );
    expect(meta.noise).toEqual({
      kind: 'detector',
      detector: { electronsPerCount: 1, offsetCounts: 0, readNoiseE: 5, excessNoise: 1 },
    });
    expect(resolved.detector).toEqual({ read_noise_e: 5 });
    for (const detector of [
      { electrons_per_count: 0 },
      { excess_noise: 0.5 },
      { read_noise_e: -1 },
      { offset_counts: Number.NaN },
    ]) {
      const { problems } = await inspect(plain, { detector });
      expect(problems[0].where).toBe(`scan.detector.${Object.keys(detector)[0]}`);
    }
  });

  it('looks at a bounded share of a large cube, spread over it', async () => {
    const data = new Uint16Array(1_600_000).fill(5);
    const container = fakeContainer({
      arrays: { counts: { shape: [40, 40, 1000], data }, wavelength_nm: wavelengths(1000) },
    });
    const inspection = await detectScan(container, [], {}, 'big.h5');
    expect(planOf(inspection).meta.noise.kind).toBe('poisson');
    expect(container.handedOut.values).toBeLessThan(600_000);
  });

  it('exposure and serpentine rows are read where the file states them', async () => {
    const file: FakeFile = { ...plain, facts: { exposure_ms: 400, scan_pattern: 'Serpentine' } };
    const { meta, cube } = planOf(await inspect(file));
    expect(meta.exposureS).toBe(0.4);
    expect(cube.serpentine).toBe(true);
    expect(planOf(await inspect(file, { serpentine: false, exposure_s: 2 })).meta.exposureS).toBe(
      2,
    );
    expect(guess(await inspect(plain), 'serpentine')).toMatchObject({
      source: 'guess',
      alternatives: [{ choice: { serpentine: true } }],
    });
  });
});

describe('several problems', () => {
  it('are all told', async () => {
    const { problems } = await inspect(plain, {
      laser: { value: -1, unit: 'nm' },
      pixel: { x: -1, y: 1, unit: 'nm' },
      exposure_s: 0,
      height: { file: 'none.npy' },
      axis: { unit: 'eV', kind: 'shift' },
    });
    expect(problems.map(({ where }) => where).sort()).toEqual([
      'scan.axis.unit',
      'scan.exposure_s',
      'scan.height.file',
      'scan.laser',
      'scan.pixel.x',
    ]);
  });
});

describe('the resolved scan block', () => {
  const files: readonly (readonly [string, FakeFile, ScanChoices])[] = [
    ['bare arrays', plain, {}],
    [
      'a height map and positions',
      {
        facts: { laser: '594.1 nm', exposure_s: 0.5 },
        arrays: {
          '/counts': numbered(3, 4, 10),
          '/wavelength': wavelengths(10),
          '/x': { shape: [3], data: ramp(3, 5, 0.1), attributes: { units: 'um' } },
          '/y': { shape: [4], data: ramp(4, 0, 0.3), attributes: { units: 'um' } },
          '/height': numbered(4, 3),
        },
      },
      {},
    ],
    [
      'a gate voltage',
      {
        arrays: {
          counts: numbered(7, 10),
          gate_volts: { shape: [7], data: ramp(7, -1, 0.1) },
          wavelength_nm: wavelengths(10),
        },
      },
      {},
    ],
    [
      'values of the recipe',
      { format: 'npy', arrays: { '': numbered(2, 3, 4) } },
      { axis: { values: [4, 3, 2, 1], unit: 'eV' } },
    ],
    [
      'a shift',
      {
        format: 'text',
        arrays: { raman_shift_cm1: { shape: [5], data: ramp(5, 100, 10) }, counts: numbered(5) },
      },
      { laser: { value: 532, unit: 'nm' } },
    ],
  ];

  it.each(files)(
    'of %s replays to the same plan and guesses nothing',
    async (_name, file, choices) => {
      const first = planOf(await inspect(file, choices));
      const again = await inspect(file, JSON.parse(JSON.stringify(first.resolved)));
      expect(again.plan).toEqual(first);
      expect(
        again.guesses.filter(({ source }) => source === 'guess' || source === 'missing'),
      ).toEqual([]);
    },
  );
});
