/** Bands in every unit against lamp lines, air and Raman shifts from outside. */
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { bandEnergies, bandToEnergy, energyToBandUnit } from '../../src/recipe/band-energies';
import type { RecipeBand } from '../../src/recipe/schema';

const band = (from: number, to: number, unit: RecipeBand['unit']): RecipeBand => ({
  name: 'line',
  from,
  to,
  unit,
});
/** hc, eV nm, rounded as CODATA 2018 lists it: 1239.841 984. */
const hc = 1239.841984;

describe('a band in eV', () => {
  it('in nm in air is where the neon line is in vacuum', () => {
    // Ne I, NIST ASD (Saloman & Sansonetti, J. Phys. Chem. Ref. Data 33 (2004)): 640.2248 nm in air. In
    // vacuum 640.4018 nm (NIST ASD, from memory), so 1.936038 eV; both to 1e-4 nm.
    const { fromEv, toEv } = bandToEnergy(band(640.2248, 650, 'nm'), null, 'air');
    expect(Math.abs(toEv - hc / 640.4018)).toBeLessThan(4e-7);
    expect(fromEv).toBeLessThan(toEv);
    const inVacuum = bandToEnergy(band(640.4018, 650, 'nm'), null, 'vacuum');
    expect(Math.abs(inVacuum.toEv - hc / 640.4018)).toBeLessThan(1e-8);
  });

  it('in cm-1 is where silicon scatters the helium–neon laser', () => {
    // HeNe 632.9910 nm in vacuum, Si at 520.7 cm-1: 654.5654 nm in vacuum (10⁷/λ differences by hand).
    const { fromEv } = bandToEnergy(band(500, 520.7, 'cm-1'), hc / 632.991, 'air');
    expect(Math.abs(fromEv - hc / 654.5654)).toBeLessThan(4e-7);
  });

  it('in meV is a thousandth', () => {
    expect(bandToEnergy(band(1865, 1925, 'meV'), null, 'air')).toEqual({
      fromEv: 1.865,
      toEv: 1.925,
      floor: 'none',
    });
  });

  it('has its ends in ascending order however they were written', () => {
    const one = bandToEnergy(band(1.9, 2, 'eV'), null, 'air');
    expect(bandToEnergy(band(2, 1.9, 'eV'), null, 'air')).toEqual(one);
    expect(one).toEqual({ fromEv: 1.9, toEv: 2, floor: 'none' });
  });

  it('keeps its floor', () => {
    expect(bandToEnergy({ ...band(1, 2, 'eV'), floor: 'ends' }, null, 'air').floor).toBe('ends');
  });
});

describe('a band without a place', () => {
  const bands = [band(1.9, 2, 'eV'), { ...band(405, 430, 'cm-1'), name: 'A1' }];

  it('in cm-1 without a laser is refused and named', () => {
    expect(() => bandEnergies({ recipe: 1, bands }, null, 'air')).toThrow(
      'Raman shifts in cm-1 need the laser, which is not known (bands[1], "A1"). State scan.laser, or give the band in eV.',
    );
    expect(() => energyToBandUnit(2, 'cm-1', null, 'air')).toThrow(/need the laser/);
    expect(bandEnergies({ recipe: 1, bands }, 2.087, 'air')).toHaveLength(2);
  });

  it('beyond what the laser has, or in air that is opaque, is refused', () => {
    expect(() => bandToEnergy(band(0, 20_000, 'cm-1'), 2.087, 'air')).toThrow(
      /more than the laser/,
    );
    expect(() => bandToEnergy(band(150, 200, 'nm'), null, 'air')).toThrow(/opaque below 185 nm/);
    expect(bandToEnergy(band(150, 200, 'nm'), null, 'vacuum').toEv).toBeCloseTo(hc / 150, 6);
  });

  it('whose ends fall together in energy is refused', () => {
    expect(() => bandToEnergy(band(1e-17, 0, 'cm-1'), 2, 'air')).toThrow(/fall together/);
  });
});

describe('an energy in the unit of a band', () => {
  it('comes back to itself', () => {
    const unit = fc.constantFrom<RecipeBand['unit']>('eV', 'meV', 'nm', 'cm-1');
    const energy = fc.double({ min: 0.7, max: 4, noNaN: true });
    fc.assert(
      fc.property(energy, unit, fc.constantFrom('air', 'vacuum'), (energyEv, unit, medium) => {
        const value = energyToBandUnit(energyEv, unit, 2.087, medium);
        const other = energyToBandUnit(0.5, unit, 2.087, medium);
        const { toEv } = bandToEnergy(band(value, other, unit), 2.087, medium);
        expect(Math.abs(toEv / energyEv - 1)).toBeLessThan(1e-12);
      }),
    );
  });
});
