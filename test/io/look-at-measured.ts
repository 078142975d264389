/** Opens the measured files beside the checkout, where they are, and picks out of what was found. */
import { existsSync, readFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import { memorySource } from '../../src/io/byte-source';
import type { Container } from '../../src/io/container';
import { detectScan } from '../../src/io/detect/detect-scan';
import { loadSlab } from '../../src/io/load-slab';
import { openContainer } from '../../src/io/open-scan';
import type { ScanChoices } from '../../src/io/scan-choices';
import type { Guess, GuessField, Inspection, ScanPlan } from '../../src/io/scan-plan';
import type { CountsArray } from '../../src/science/scan';

const root = fileURLToPath(new URL('../../../shared/real-data/', import.meta.url));
export const isThere = existsSync(root);
if (!isThere) {
  process.stderr.write(
    'measured-scans: no measured data beside the checkout; these checks are not run\n',
  );
}

export interface Looked {
  readonly container: Container;
  readonly inspection: Inspection;
}

function openFile(path: string): Promise<Container> {
  const name = path.split('/').at(-1) ?? path;
  return openContainer(memorySource(name, readFileSync(root + path)));
}

export async function look(
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

export function planOf({ inspection }: Looked): ScanPlan {
  if (inspection.plan === null) throw new Error(inspection.problems.map(String).join('; '));
  return inspection.plan;
}

export function guess({ inspection }: Looked, field: GuessField): Guess {
  const found = inspection.guesses.find((one) => one.field === field);
  if (found === undefined) throw new Error(`no guess of ${field}`);
  return found;
}

export const countsOf = async (looked: Looked): Promise<CountsArray> => {
  const plan = planOf(looked);
  return (await loadSlab(looked.container, plan, { y0: 0, y1: plan.meta.shape.ny })).counts;
};

/** Position of the highest channel of one pixel, eV. */
export async function topEv(looked: Looked, pixel = 0): Promise<number> {
  const { shape, axis } = planOf(looked).meta;
  const spectrum = (await countsOf(looked)).slice(pixel * shape.nk, (pixel + 1) * shape.nk);
  let top = 0;
  for (let k = 1; k < shape.nk; k++) if (spectrum[k] > spectrum[top]) top = k;
  return axis.centresEv[top];
}
