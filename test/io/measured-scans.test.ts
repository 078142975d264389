/** Measured maps and lines: each opens with the axis, shape and laser its own description states, or is refused for a reason. */
import { describe, expect, it } from 'vitest';
import { previewScan } from '../../src/io/preview';
import type { ScanChoices } from '../../src/io/scan-choices';
import { airNmFromVacuum } from '../../src/science/air';
import { cm1FromEv, nmFromEv, shiftCm1FromEv } from '../../src/science/units';
import { countsOf, guess, isThere, type Looked, look, planOf, topEv } from './look-at-measured';

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
