// The committed copies in sample-data: that they are what the generator makes, and that their recipes fit them.
import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { encodeSample } from '../../src/io/sample-file';
import { validateRecipe } from '../../src/recipe/validate';
import { vacuumNmFromAir } from '../../src/science/air';
import { generateScenario, scenarioNames } from '../../src/science/scenarios/scenario';
import { evFromNm } from '../../src/science/units';

const committed = (name: string) =>
  readFileSync(new URL(`../../sample-data/${name}`, import.meta.url));

describe.each(scenarioNames)('sample-data/%s', (name) => {
  const scan = generateScenario(name, { seed: 1, ny: 64, nx: 64, nk: 512 });
  const recipe = JSON.parse(committed(`${name}.recipe.json`).toString());

  it('is what the generator makes today, byte for byte', async () => {
    for (const { name: file, bytes } of await encodeSample(scan, `${name}.h5`)) {
      expect(committed(file).equals(bytes), file).toBe(true);
    }
  });

  it('stays small', () => {
    for (const file of [`${name}.h5`, `${name}.truth.json`]) {
      expect(committed(file).length).toBeLessThan(3 * 2 ** 20);
    }
  });

  it('has a recipe that is valid, pinned at the landmarks, with bands inside the scan', () => {
    expect(validateRecipe(recipe)).toMatchObject({ ok: true });
    expect(recipe.pins).toEqual(
      scan.truth.landmarks.map(({ label, x, y }, i) => ({ name: 'ABC'[i], x, y, label })),
    );
    const { centresEv } = axisOf(scan);
    for (const band of recipe.bands) {
      if (band.unit !== 'eV') continue;
      expect(band.from).toBeGreaterThan(centresEv.at(-1)!);
      expect(band.to).toBeLessThan(centresEv[0]!);
    }
    expect(recipe.scan.detector.read_noise_e).toBe(scan.truth.constants.read_noise_counts);
  });

  it('has bands that tell its pins apart', () => {
    const bands = recipe.bands.filter((band: { unit: string }) => band.unit === 'eV');
    const brightest = recipe.pins.map((pin: { x: number; y: number }) => {
      const sums = bands.map((band: { from: number; to: number }) => lightIn(pin, band));
      return bands[sums.indexOf(Math.max(...sums))].name;
    });
    const expected =
      name === 'tent-field' ? ['exciton', 'tail', 'shoulder'] : ['high', 'middle', 'low'];
    expect(brightest).toEqual(expected);
  });

  function lightIn(pin: { x: number; y: number }, band: { from: number; to: number }): number {
    const { centresEv } = axisOf(scan);
    const start = (pin.y * 64 + pin.x) * 512;
    return centresEv.reduce(
      (sum, ev, k) =>
        ev > band.from && ev < band.to ? sum + scan.counts[start + k]! - scan.darkCounts[k]! : sum,
      0,
    );
  }
});

function axisOf(scan: { readonly wavelengthAirNm: Float64Array }) {
  return { centresEv: scan.wavelengthAirNm.map((nm) => evFromNm(vacuumNmFromAir(nm))) };
}
