import { describe, expect, it } from 'vitest';
import { memorySource } from '../../src/io/byte-source';
import { detectScan } from '../../src/io/detect/detect-scan';
import { loadHeight } from '../../src/io/load-height';
import { loadSlab } from '../../src/io/load-slab';
import { openContainer } from '../../src/io/open-scan';
import { encodeSample, sampleExtensions, sampleFormat } from '../../src/io/sample-file';
import { sampleTruthJson } from '../../src/io/sample-truth';
import type { ScanChoices } from '../../src/io/scan-choices';
import { vacuumNmFromAir } from '../../src/science/air';
import { generateScenario } from '../../src/science/scenarios/scenario';
import { evFromNm } from '../../src/science/units';

const scan = generateScenario('tent-field', { ny: 6, nx: 9, nk: 80, seed: 2 });

/** What one array alone cannot say; the other formats need no help. */
const choices: Record<string, ScanChoices> = {
  '.npy': { laser: { value: 594.1, unit: 'nm' }, pixel: { x: 15, y: 15, unit: 'nm' } },
};

async function reopened(extension: string) {
  const files = await encodeSample(scan, `field${extension}`);
  const opened = await Promise.all(
    files
      .filter(({ name }) => !name.endsWith('.json'))
      .map(async ({ name, bytes }) => ({
        name,
        container: await openContainer(memorySource(name, bytes)),
      })),
  );
  const [own, ...companions] = opened;
  const stated = choices[extension] ?? {};
  const inspection = await detectScan(own!.container, companions, stated, own!.name);
  expect(inspection.problems).toEqual([]);
  return { files, opened, inspection, plan: inspection.plan! };
}

describe.each(sampleExtensions)('a demo scan written as %s', (extension) => {
  it('opens without a guess gone wrong', async () => {
    const { plan, inspection } = await reopened(extension);
    const { meta } = plan;
    expect(meta.shape).toEqual(scan.shape);
    expect(inspection.warnings).toEqual([]);
    const energies = [...scan.wavelengthAirNm].map((nm) => evFromNm(vacuumNmFromAir(nm)));
    expect([...meta.axis.centresEv]).toEqual(energies.toReversed());
    expect(meta.laserEv).toBe(evFromNm(vacuumNmFromAir(594.1)));
    expect(meta.x).toMatchObject({ unit: 'nm', isLength: true, pitch: 15 });
    expect(meta.y).toMatchObject({ unit: 'nm', isLength: true, pitch: 15 });
    if (extension !== '.npy') expect(meta.exposureS).toBe(0.5);
    expect(meta.noise).toEqual({ kind: 'poisson' });
  });

  it('gives back every count', async () => {
    const { plan, opened } = await reopened(extension);
    const slab = await loadSlab(opened[0]!.container, plan, { y0: 0, y1: 6 });
    expect(slab.counts).toBeInstanceOf(Uint16Array);
    for (let pixel = 0; pixel < 54; pixel++) {
      const spectrum = scan.counts.subarray(pixel * 80, pixel * 80 + 80).toReversed();
      expect(slab.counts.subarray(pixel * 80, pixel * 80 + 80)).toEqual(spectrum);
    }
  });

  it('gives back the height map', async () => {
    const { plan, opened } = await reopened(extension);
    const { file } = plan.height!;
    const { container } = opened.find(({ name }) => name === file) ?? opened[0]!;
    const map = await loadHeight(plan, container);
    expect([...map.values]).toEqual([...Float32Array.from(scan.heightNm)]);
  });

  it('has its truth beside it, and is the same each time', async () => {
    const files = await encodeSample(scan, `field${extension}`);
    expect(files[0]!.name).toBe(`field${extension}`);
    expect(files.at(-1)!.name).toBe('field.truth.json');
    expect(new TextDecoder().decode(files.at(-1)!.bytes)).toBe(sampleTruthJson(scan));
    expect(await encodeSample(scan, `field${extension}`)).toEqual(files);
  });
});

describe('the name of a demo scan file', () => {
  it('gives format and stem, in capitals too', () => {
    expect(sampleFormat('a.b.h5')).toEqual({ extension: '.h5', stem: 'a.b' });
    expect(sampleFormat('A.H5')).toEqual({ extension: '.h5', stem: 'A' });
  });

  it.each(['field', 'field.csv', 'field.h5.gz', '.h5', ''])('refuses "%s"', (name) => {
    expect(() => sampleFormat(name)).toThrowError(`cannot be written as "${name}"`);
  });
});
