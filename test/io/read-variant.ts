/** Opens, looks at and loads a variant of the scan, as the engine does. */
import { memorySource } from '../../src/io/byte-source';
import { detectScan } from '../../src/io/detect/detect-scan';
import { loadSlab } from '../../src/io/load-slab';
import { openContainer } from '../../src/io/open-scan';
import type { Variant } from './scan-variants';

/** @throws the first problem, when there is no plan */
export async function readVariant({ file, bytes, choices = {}, companions = {} }: Variant) {
  const container = await openContainer(memorySource(file, bytes));
  const beside = await Promise.all(
    Object.entries(companions).map(async ([name, content]) => ({
      name,
      container: await openContainer(memorySource(name, content)),
    })),
  );
  const inspection = await detectScan(container, beside, choices, file);
  if (inspection.plan === null) throw inspection.problems[0];
  const { shape } = inspection.plan.meta;
  const slab = await loadSlab(container, inspection.plan, { y0: 0, y1: shape.ny });
  return { plan: inspection.plan, slab };
}
