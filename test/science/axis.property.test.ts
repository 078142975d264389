/** Laws of axes: whatever way an axis is recorded, the same light falls on the same energies. */
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { airNmFromVacuum, vacuumNmFromAir } from '../../src/science/air';
import { type AxisScale, recordAxis } from '../../src/science/axis';
import { cm1FromEv, nmFromEv, shiftCm1FromEv } from '../../src/science/units';

/** Strictly ascending energies between 0.3 and 6 eV, steps not uniform. */
const energies = fc
  .array(fc.double({ min: 1e-4, max: 5e-2, noNaN: true }), { minLength: 2, maxLength: 60 })
  .map((steps) => {
    const values: number[] = [];
    let at = 0.3;
    for (const step of steps) {
      at += step;
      values.push(at);
    }
    return values;
  });

const laserEv = 7;

const recordings: readonly [AxisScale, (ev: number) => number][] = [
  [{ kind: 'energy', unit: 'eV' }, (ev) => ev],
  [{ kind: 'energy', unit: 'meV' }, (ev) => ev * 1000],
  [{ kind: 'energy', unit: 'cm-1' }, cm1FromEv],
  [{ kind: 'wavelength', unit: 'nm', medium: 'vacuum' }, nmFromEv],
  [{ kind: 'wavelength', unit: 'um', medium: 'vacuum' }, (ev) => nmFromEv(ev) / 1000],
  [
    { kind: 'wavelength', unit: 'angstrom', medium: 'air' },
    (ev) => airNmFromVacuum(nmFromEv(ev)) * 10,
  ],
  [{ kind: 'shift', unit: 'cm-1', laserEv }, (ev) => shiftCm1FromEv(ev, laserEv)],
];

describe('recordAxis', () => {
  it.each(recordings)(
    'gives back the energies recorded as %o, ascending or descending',
    (scale, record) => {
      fc.assert(
        fc.property(energies, fc.boolean(), (centres, isTurned) => {
          const values = centres.map(record);
          if (isTurned) values.reverse();
          const { energy, channels } = recordAxis(values, scale, '');
          expect(energy.centresEv.length).toBe(centres.length);
          for (let k = 0; k < centres.length; k++) {
            // seven roundings of relative size 1e-16 on the way there and back, on values up to 7 eV
            expect(Math.abs(energy.centresEv[k] - centres[k])).toBeLessThan(2e-13);
            expect(energy.edgesEv[k]).toBeLessThan(energy.centresEv[k]);
            expect(energy.edgesEv[k + 1]).toBeGreaterThan(energy.centresEv[k]);
          }
          const runsUp = values.length > 1 && channels[0] < channels[channels.length - 1];
          expect([...channels]).toEqual(
            runsUp ? centres.map((_, k) => k) : centres.map((_, k) => centres.length - 1 - k),
          );
        }),
      );
    },
  );

  it('drops exactly the channels without a value, wherever they are', () => {
    fc.assert(
      fc.property(energies, fc.infiniteStream(fc.boolean()), (centres, holes) => {
        const values = centres.map((ev) => (holes.next().value === true ? Number.NaN : ev));
        const kept = values.flatMap((ev, k) => (Number.isNaN(ev) ? [] : [k]));
        fc.pre(kept.length >= 2);
        const recorded = recordAxis(values, { kind: 'energy', unit: 'eV' }, '');
        expect([...recorded.channels]).toEqual(kept);
        expect(recorded.droppedChannels).toBe(values.length - kept.length);
        expect([...recorded.energy.centresEv]).toEqual(kept.map((k) => centres[k]));
      }),
    );
  });
});

describe('air and vacuum', () => {
  it('undo one another from 185 nm to 20 µm', () => {
    fc.assert(
      fc.property(fc.double({ min: 185, max: 20_000, noNaN: true }), (airNm) => {
        const back = airNmFromVacuum(vacuumNmFromAir(airNm));
        expect(Math.abs(back - airNm) / airNm).toBeLessThan(4e-16);
      }),
    );
  });
});
