import { describe, expect, it } from 'vitest';
import type { ScanChoices } from '../../../src/io/scan-choices';
import { type FakeFile, numbered, ramp } from '../fake-container';
import { inspect, plain, planOf, wavelengths } from './inspect';

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
