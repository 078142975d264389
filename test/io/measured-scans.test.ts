/** Measured files: each opens with the axis, shape and laser its own description states, or is refused for a reason. */
import { existsSync, readFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import { describe, expect, it } from 'vitest';
import { memorySource } from '../../src/io/byte-source';
import type { Container } from '../../src/io/container';
import { detectScan } from '../../src/io/detect/detect-scan';
import { loadSlab } from '../../src/io/load-slab';
import { openContainer } from '../../src/io/open-scan';
import { previewScan } from '../../src/io/preview';
import type { ScanChoices } from '../../src/io/scan-choices';
import type { GuessField, Inspection, ScanPlan } from '../../src/io/scan-plan';
import { airNmFromVacuum } from '../../src/science/air';
import { cm1FromEv, nmFromEv, shiftCm1FromEv } from '../../src/science/units';

const root = fileURLToPath(new URL('../../../shared/real-data/', import.meta.url));
const isThere = existsSync(root);
if (!isThere) {
  process.stderr.write(
    'measured-scans: no measured data beside the checkout; these checks are not run\n',
  );
}

interface Looked {
  readonly container: Container;
  readonly inspection: Inspection;
}

function openFile(path: string): Promise<Container> {
  const name = path.split('/').at(-1) ?? path;
  return openContainer(memorySource(name, readFileSync(root + path)));
}

async function look(
  path: string,
  choices: ScanChoices = {},
  companions: readonly string[] = [],
): Promise<Looked> {
  const container = await openFile(path);
  const beside = await Promise.all(
    companions.map(async (one) => ({
      name: one.split('/').at(-1) ?? one,
      container: await openFile(one),
    })),
  );
  const name = path.split('/').at(-1) ?? path;
  return { container, inspection: await detectScan(container, beside, choices, name) };
}

function planOf({ inspection }: Looked): ScanPlan {
  if (inspection.plan === null) throw new Error(inspection.problems.map(String).join('; '));
  return inspection.plan;
}

function guess({ inspection }: Looked, field: GuessField) {
  const found = inspection.guesses.find((one) => one.field === field);
  if (found === undefined) throw new Error(`no guess of ${field}`);
  return found;
}

const countsOf = async (looked: Looked) => {
  const plan = planOf(looked);
  return (await loadSlab(looked.container, plan, { y0: 0, y1: plan.meta.shape.ny })).counts;
};

/** Position of the highest channel of one pixel, eV. */
async function topEv(looked: Looked, pixel = 0): Promise<number> {
  const { shape, axis } = planOf(looked).meta;
  const spectrum = (await countsOf(looked)).slice(pixel * shape.nk, (pixel + 1) * shape.nk);
  let top = 0;
  for (let k = 1; k < shape.nk; k++) if (spectrum[k] > spectrum[top]) top = k;
  return axis.centresEv[top];
}

describe.runIf(isThere)('gate sweeps of a heterobilayer', () => {
  const sweep = (name: string) => look(`pl-mose2ws2-gate-sweeps/${name}.npz`);

  it.each([
    ['density_sweep', 261, -6.5, 0.05],
    ['field_sweep', 161, -8, 0.1],
  ])('%s is a line of %i spectra along the gate voltage', async (name, nx, first, step) => {
    const looked = await sweep(name);
    const { meta, cube } = planOf(looked);
    expect(meta.shape).toEqual({ ny: 1, nx, nk: 1340 });
    expect(meta.x).toMatchObject({ label: 'gate_volts', unit: 'V', isLength: false });
    expect(meta.x.pitch).toBeCloseTo(step, 9);
    expect(meta.x.values?.[0]).toBeCloseTo(first, 9);
    expect(guess(looked, 'kind').label).toBe('wavelength');
    expect(guess(looked, 'medium')).toMatchObject({ label: 'air', source: 'guess' });
    expect(guess(looked, 'laser')).toMatchObject({ source: 'absent' });
    expect(airNmFromVacuum(nmFromEv(meta.axis.centresEv[1339]))).toBeCloseTo(728.104, 3);
    expect(airNmFromVacuum(nmFromEv(meta.axis.centresEv[0]))).toBeCloseTo(811.447, 3);
    expect(cube.channels[0]).toBe(1339);
    // dark subtracted: whole numbers, some below zero
    expect(meta.noise.kind).toBe('none');
    expect(guess(looked, 'noise').evidence).toContain('negative values');
    expect(meta.quantity).toBe('counts');
  });

  it('have their lines where they were described', async () => {
    const density = await sweep('density_sweep');
    expect(airNmFromVacuum(nmFromEv(await topEv(density, 0)))).toBeCloseTo(791.7, 0);
    const field = await sweep('field_sweep');
    // 5 V and 6 V in steps of 0.1 V from −8 V
    expect(airNmFromVacuum(nmFromEv(await topEv(field, 130)))).toBeCloseTo(790.1, 0);
    expect(airNmFromVacuum(nmFromEv(await topEv(field, 140)))).toBeCloseTo(802.4, 0);
  });
});

describe.runIf(isThere)('the emulsion map', () => {
  const folder = 'raman-emulsion/';
  const laser = { value: 785, unit: 'nm' } as const;

  it('as npy is refused without an axis, and without a laser, and opens with both', async () => {
    const bare = await look(`${folder}emulsion_yxk.npy`);
    expect(bare.inspection.problems.map(({ what }) => what)).toEqual([
      'no spectral axis with 253 values was found',
    ]);
    const axis = [`${folder}axis_shift_cm1.csv`];
    const unlit = await look(`${folder}emulsion_yxk.npy`, {}, axis);
    expect(unlit.inspection.problems.map(({ what }) => what)).toEqual([
      'the axis is a Raman shift, and the laser is not stated',
    ]);
    const looked = await look(`${folder}emulsion_yxk.npy`, { laser }, axis);
    const { meta } = planOf(looked);
    expect(meta.shape).toEqual({ ny: 60, nx: 60, nk: 253 });
    expect(guess(looked, 'axis')).toMatchObject({ source: 'guess' });
    expect(shiftCm1FromEv(meta.axis.centresEv[0], meta.laserEv ?? 0)).toBeCloseTo(1766, 6);
    expect(shiftCm1FromEv(meta.axis.centresEv[252], meta.laserEv ?? 0)).toBeCloseTo(1010, 6);
    expect(meta.noise.kind).toBe('none');
  });

  it('holds the same numbers as npy, HDF5 and text', async () => {
    const choices: ScanChoices = { laser, axis: { kind: 'shift', unit: 'cm-1' } };
    const npy = await look(`${folder}emulsion_yxk.npy`, choices, [`${folder}axis_shift_cm1.csv`]);
    const h5 = await look(`${folder}emulsion_nxdata.h5`, choices);
    const tsv = await look(`${folder}emulsion_rows.tsv`, choices);
    expect(guess(h5, 'data')).toMatchObject({
      source: 'file',
      label: '/entry/data/intensity · 60 × 60 × 253, float64',
    });
    const expected = await countsOf(npy);
    const differing = async (other: Looked): Promise<readonly number[]> => {
      const counts = await countsOf(other);
      expect(counts.length).toBe(expected.length);
      expect(planOf(other).meta.axis).toEqual(planOf(npy).meta.axis);
      expect(planOf(other).meta.shape).toEqual(planOf(npy).meta.shape);
      return Array.from(expected.keys()).filter((i) => counts[i] !== expected[i]);
    };
    expect(await differing(h5)).toEqual([]);
    // One value was written a last bit apart, -0.060533 for -0.060533000000000003 (numpy.loadtxt finds
    // the same one): pixel 1383, the 227th of 253 shifts upwards, channel 26 in energy.
    expect(await differing(tsv)).toEqual([1383 * 253 + 26]);
  });

  it('as text has bare numbers for an axis, which is not enough', async () => {
    const looked = await look(`${folder}emulsion_rows.tsv`);
    expect(looked.inspection.plan).toBeNull();
    expect(guess(looked, 'kind').source).toBe('missing');
  });

  it('has the mean spectrum and the brightest pixel that were described', async () => {
    const looked = await look(`${folder}emulsion_nxdata.h5`, { laser });
    const { meta } = planOf(looked);
    const { meanSpectrum, totals, step } = await previewScan(looked.container, planOf(looked));
    const channel = (shift: number): number =>
      meta.axis.centresEv.findIndex(
        (ev) => Math.abs(shiftCm1FromEv(ev, meta.laserEv ?? 0) - shift) < 1,
      );
    // means by NumPy over emulsion_yxk.npy; their whole parts are in the description
    for (const [shift, mean] of [
      [1085, 646.546183],
      [1127, 230.202696],
      [1154, 709.901013],
      [1313, 695.818225],
      [1451, 1152.370694],
    ]) {
      expect(Math.abs(meanSpectrum[channel(shift)] - mean)).toBeLessThan(1e-6);
    }
    expect([step, totals.length]).toEqual([1, 3600]);
    const counts = await countsOf(looked);
    const at1313 = Array.from({ length: 3600 }, (_, pixel) => counts[pixel * 253 + channel(1313)]);
    // the map's highest value, 3146, by NumPy at row 1, column 24
    expect(Math.max(...at1313)).toBe(3146.1);
    expect(at1313.indexOf(3146.1)).toBe(1 * 60 + 24);
  });
});

describe.runIf(isThere)('the infrared maps of a diamond', () => {
  const folder = 'ir-diamond-fn7112/';

  it('as HDF5 has two axes that fit and 100 µm pixels, and holds absorbance', async () => {
    const looked = await look(`${folder}fn7112_map.h5`);
    const { meta } = planOf(looked);
    expect(meta.shape).toEqual({ ny: 22, nx: 16, nk: 3527 });
    expect(guess(looked, 'order').source).toBe('file');
    expect(guess(looked, 'axis').label).toMatch(/^\/scan\/wavenumber/);
    expect(guess(looked, 'axis').alternatives.map(({ label }) => label)).toEqual(['/scan/energy']);
    expect(cm1FromEv(meta.axis.centresEv[0])).toBeCloseTo(599.778, 3);
    expect(cm1FromEv(meta.axis.centresEv[3526])).toBeCloseTo(3999.808, 3);
    expect([meta.x.pitch, meta.y.pitch, meta.x.unit]).toEqual([100_000, 100_000, 'nm']);
    expect(meta.quantity).toBe('absorbance');
    expect(meta.noise.kind).toBe('none');
    expect(meta.laserEv).toBeNull();
    const [energy] = guess(looked, 'axis').alternatives;
    const other = planOf(await look(`${folder}fn7112_map.h5`, energy.choice));
    for (const k of [0, 1000, 3526]) {
      expect(other.meta.axis.centresEv[k]).toBeCloseTo(meta.axis.centresEv[k], 7);
    }
  });

  it('as npz has absolute wavenumbers, being absorbance', async () => {
    const looked = await look(`${folder}fn7112_zone_50um.npz`);
    const { meta } = planOf(looked);
    expect(meta.shape).toEqual({ ny: 13, nx: 9, nk: 3527 });
    expect(guess(looked, 'kind')).toMatchObject({ label: 'photon energy' });
    expect(cm1FromEv(meta.axis.centresEv[0])).toBeCloseTo(599.778, 3);
  });

  it('as bare columns is refused until its kind is stated', async () => {
    const path = `${folder}one_pixel_original_0352.csv`;
    const looked = await look(path);
    expect(looked.inspection.plan).toBeNull();
    expect(guess(looked, 'kind').source).toBe('missing');
    const stated = planOf(await look(path, { axis: { kind: 'energy', unit: 'cm-1' } }));
    expect(stated.meta.shape).toEqual({ ny: 1, nx: 1, nk: 3527 });
    expect(cm1FromEv(stated.meta.axis.centresEv[0])).toBeCloseTo(599.778, 6);
  });
});

describe.runIf(isThere)('luminescence of diamonds', () => {
  it.each([
    'control_77K',
    'dark_laser_off',
    'fn7112_77K_a',
    'fn7112_77K_b',
    'fn7112_77K_c',
    'fn7112_room',
    'fn7114_77K',
    'no_sample_LN2_cuvette',
  ])('%s is one spectrum over wavelengths, averaged', async (name) => {
    const looked = await look(`pl-diamond/${name}.csv`);
    const { meta } = planOf(looked);
    expect(meta.shape).toEqual({ ny: 1, nx: 1, nk: 2910 });
    expect(airNmFromVacuum(nmFromEv(meta.axis.centresEv[2909]))).toBeCloseTo(535.97554, 5);
    expect(airNmFromVacuum(nmFromEv(meta.axis.centresEv[0]))).toBeCloseTo(746.28246, 5);
    expect(guess(looked, 'noise').evidence).toContain('not whole numbers');
    expect(meta.laserEv).toBeNull();
  });

  it('has the Raman line of diamond at 1332 cm-1 from the laser, as far as the axis is right', async () => {
    const looked = await look('pl-diamond/control_77K.csv', {
      laser: { value: 532.06, unit: 'nm' },
    });
    // 572.4 nm under 532.06 nm, both in one medium; channels are 2 cm-1 apart. Diamond: 1332.5 cm-1 (from memory)
    const shift = shiftCm1FromEv(await topEv(looked), planOf(looked).meta.laserEv ?? 0);
    expect(Math.abs(shift - 1332)).toBeLessThan(8);
  });
});

describe.runIf(isThere)('reference spectra under 532 nm', () => {
  const folder = 'raman-reference-532nm/';
  const later = [
    'neon_400ms',
    'neon_5ms',
    'silicon_S0B',
    'silicon_S0N',
    'silicon_S0P',
    'silicon_S1N',
    'silicon_Sil',
  ];
  const earlier = ['calcite', 'polystyrene', 'silicon_S0B_2021'];

  it.each<[string, number]>([
    ...[...later, 'srm2242a_glass'].map((name): [string, number] => [name, 532.14]),
    ...earlier.map((name): [string, number] => [name, 532.07]),
  ])('%s has its laser, %f nm, from wavenumber and shift', async (name, laserNm) => {
    const looked = await look(`${folder}${name}.csv`);
    const { meta } = planOf(looked);
    expect(guess(looked, 'data').label).toMatch(/^raw_counts/);
    expect(guess(looked, 'data').alternatives.map(({ choice }) => choice.data)).toEqual([
      'raw_minus_dark',
      'dark_counts',
    ]);
    expect(guess(looked, 'axis').label).toMatch(/^raman_shift_cm1/);
    expect(guess(looked, 'laser').source).toBe('file');
    expect(nmFromEv(meta.laserEv ?? 0)).toBeCloseTo(laserNm, 2);
    expect(meta.noise.kind).toBe('poisson');
    expect(meta.shape.ny * meta.shape.nx).toBe(1);
  });

  it('leave out channels with an empty axis cell, and say so', async () => {
    const looked = await look(`${folder}neon_5ms.csv`);
    const { nk } = planOf(looked).meta.shape;
    expect([1858, 1859]).toContain(nk);
    expect(looked.inspection.warnings.join(' ')).toMatch(new RegExp(`${2048 - nk}`));
    expect(planOf(await look(`${folder}calcite.csv`)).meta.shape.nk).toBe(2048);
  });

  it('have their strongest lines where they were described', async () => {
    const topShift = async (name: string, choices: ScanChoices = {}): Promise<number> => {
      const looked = await look(`${folder}${name}.csv`, choices);
      return shiftCm1FromEv(await topEv(looked), planOf(looked).meta.laserEv ?? 0);
    };
    expect(await topShift('calcite')).toBeCloseTo(1087.5, 0);
    expect(Math.abs((await topShift('polystyrene')) - 1000.6)).toBeLessThan(1.6);
    // certified glass: one broad band, its top near 2103
    expect(Math.abs((await topShift('srm2242a_glass')) - 2103)).toBeLessThan(40);
    // strongest neon line, 585.3 nm on this axis; 1e7/532.14 − 1e7/585.3
    expect(Math.abs((await topShift('neon_5ms')) - 1706.8)).toBeLessThan(4);
  });

  it('with decimal commas is refused without a laser and otherwise the same as with points', async () => {
    const path = `${folder}silicon_S0N_decimal_comma.csv`;
    const unlit = await look(path);
    expect(unlit.inspection.problems.map(({ what }) => what)).toEqual([
      'the axis is a Raman shift, and the laser is not stated',
    ]);
    expect(unlit.inspection.problems[0].hint).toContain('scan.laser');
    const laser = { value: 18792.04, unit: 'cm-1' } as const;
    const comma = await look(path, { laser });
    const point = await look(`${folder}silicon_S0N.csv`, { laser, data: 'raw_minus_dark' });
    expect(planOf(comma).meta.axis).toEqual(planOf(point).meta.axis);
    expect([...(await countsOf(comma))]).toEqual([...(await countsOf(point))]);
  });
});

describe.runIf(isThere)('five Raman set-ups', () => {
  const folder = 'raman-five-instruments/';

  it('A: descending, not uniform, laser by the name of the file alone', async () => {
    const looked = await look(`${folder}A_785nm_acetonitrile.csv`);
    const { meta, cube } = planOf(looked);
    expect(guess(looked, 'laser')).toMatchObject({ source: 'guess', label: '785 nm' });
    const laserEv = meta.laserEv ?? 0;
    expect(shiftCm1FromEv(meta.axis.centresEv[0], laserEv)).toBeCloseTo(3513.15, 6);
    expect(cube.channels[0]).toBe(0);
    expect(Math.abs(shiftCm1FromEv(await topEv(looked), laserEv) - 2256)).toBeLessThan(8);
  });

  it('B: descending, counts with fractions', async () => {
    for (const name of ['acetonitrile', 'glass_slide']) {
      const looked = await look(`${folder}B_785nm_${name}.csv`);
      expect(planOf(looked).cube.channels[0]).toBe(0);
      expect(planOf(looked).meta.noise.kind).toBe('none');
    }
  });

  it('B: points on cells lie scattered, and become a row of spectra', async () => {
    const files = [
      ['B_785nm_algae_3_points_long', 3],
      ['B_785nm_algae_CC-124_MN_10_points_long', 10],
      ['B_785nm_algae_CC-124_TAP_10_points_long', 10],
      ['B_785nm_algae_CC-125_MN_10_points_long', 10],
      ['B_785nm_algae_CC-125_TAP_10_points_long', 10],
      ['B_785nm_algae_CC-1373_MN_10_points_long', 10],
      ['B_785nm_algae_CC-1373_TAP_10_points_long', 9],
    ] as const;
    for (const [name, points] of files) {
      const looked = await look(`${folder}${name}.tsv`);
      const { meta } = planOf(looked);
      expect(meta.shape).toEqual({ ny: 1, nx: points, nk: 1015 });
      const shift = (k: number) => shiftCm1FromEv(meta.axis.centresEv[k], meta.laserEv ?? 0);
      expect(shift(0)).toBeCloseTo(1808.186523, 6);
      expect(shift(1014)).toBeCloseTo(712.416, 2);
      expect(looked.inspection.warnings.join(' ')).toContain('scattered');
      expect(guess(looked, 'pixel')).toMatchObject({
        source: 'file',
        label: `${points} scattered points`,
      });
      expect(guess(looked, 'data').alternatives).toEqual([]);
    }
  });

  it('C: laser and medium from wavelength and shift; no data stays no data', async () => {
    const looked = await look(`${folder}C_785nm_acetonitrile.csv`);
    const { meta } = planOf(looked);
    expect(nmFromEv(meta.laserEv ?? 0)).toBeCloseTo(785.041, 2);
    expect(guess(looked, 'laser').source).toBe('file');
    const counts = await countsOf(looked);
    // shift ascends, so the first ten pixels are the ten highest energies
    const isMissing = Array.from(counts, Number.isNaN);
    expect(isMissing.slice(-10).every((one) => one)).toBe(true);
    expect(isMissing.filter((one) => one).length).toBe(10);
    expect(meta.noise.kind).toBe('none');
  });

  it('D: the column called Pixel is a Raman shift', async () => {
    for (const name of ['acetonitrile', 'algae']) {
      const looked = await look(`${folder}D_532nm_${name}.csv`);
      const { meta } = planOf(looked);
      expect(guess(looked, 'kind').evidence).toContain('not a pixel number');
      const laserEv = meta.laserEv ?? 0;
      expect(shiftCm1FromEv(meta.axis.centresEv[0], laserEv)).toBeCloseTo(4764.790902, 5);
      expect(shiftCm1FromEv(meta.axis.centresEv.at(-1) ?? 0, laserEv)).toBeCloseTo(-601.279836, 5);
    }
  });

  it('E: pixels for an axis are refused with how to give another, and open with one', async () => {
    for (const name of ['acetonitrile', 'algae', 'neon']) {
      const path = `${folder}E_532nm_${name}_pixel_axis.csv`;
      const looked = await look(path);
      expect(looked.inspection.plan).toBeNull();
      expect(looked.inspection.problems[0].what).toContain(
        'counts detector pixels and carries no wavelength',
      );
      expect(looked.inspection.problems[0].hint).toContain('a file of 2048 values');
      const stated = await look(path, {
        axis: { from: 530, to: 700, kind: 'wavelength', unit: 'nm' },
      });
      expect(planOf(stated).meta.shape).toEqual({ ny: 1, nx: 1, nk: 2048 });
    }
  });
});

describe.runIf(isThere)('every measured file that opens', () => {
  it('replays from its resolved scan block and gives a preview', async () => {
    const laser = { value: 785, unit: 'nm' } as const;
    const files: readonly (readonly [string, ScanChoices])[] = [
      ['pl-mose2ws2-gate-sweeps/density_sweep.npz', {}],
      ['raman-emulsion/emulsion_nxdata.h5', { laser }],
      ['raman-emulsion/emulsion_rows.tsv', { laser, axis: { kind: 'shift' } }],
      ['ir-diamond-fn7112/fn7112_map.h5', {}],
      ['ir-diamond-fn7112/fn7112_zone_50um.npz', {}],
      ['pl-diamond/fn7112_room.csv', {}],
      ['raman-reference-532nm/silicon_S0P.csv', {}],
      ['raman-five-instruments/A_785nm_algae.csv', {}],
      ['raman-five-instruments/B_785nm_algae_3_points_long.tsv', {}],
      ['raman-five-instruments/C_785nm_algae.csv', {}],
    ];
    for (const [path, choices] of files) {
      const looked = await look(path, choices);
      const plan = planOf(looked);
      const again = await look(path, JSON.parse(JSON.stringify(plan.resolved)));
      expect(again.inspection.plan).toEqual(plan);
      expect(again.inspection.guesses.filter(({ source }) => source === 'guess')).toEqual([]);
      const preview = await previewScan(looked.container, plan);
      expect(preview.meanSpectrum.some(Number.isFinite)).toBe(true);
      expect(preview.totals.length).toBe(preview.ny * preview.nx);
    }
  });
});
