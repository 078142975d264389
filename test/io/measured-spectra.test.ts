/** Measured single spectra and points: each opens with the axis and laser its own description states, or is refused for a reason. */
import { describe, expect, it } from 'vitest';
import type { ScanChoices } from '../../src/io/scan-choices';
import { airNmFromVacuum } from '../../src/science/air';
import { nmFromEv, shiftCm1FromEv } from '../../src/science/units';
import { countsOf, guess, isThere, look, planOf, topEv } from './look-at-measured';

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
