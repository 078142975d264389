/** The spectra of the pins are those of the scan on screen, at the pixels the recipe has now. */
import { describe, expect, it } from 'vitest';
import type { Pin } from '../../src/recipe/schema';
import { openOffered } from '../../src/state/scan-opening';
import { type MadeScan, makeScan } from '../workers/made-scan';
import { openWorkbench, twoBands } from './open-workbench';

const pins: readonly Pin[] = [
  { name: 'A', x: 1, y: 2 },
  { name: 'B', x: 8, y: 6 },
];
const pinned = { ...twoBands, pins: [...pins] };

function countsAt({ counts, nk, nx }: MadeScan, { x, y }: Pin): readonly number[] {
  const from = (y * nx + x) * nk;
  return [...counts.subarray(from, from + nk)];
}

type Open = Awaited<ReturnType<typeof openWorkbench>>;
const shown = ({ workbench }: Open): Record<string, readonly number[]> =>
  Object.fromEntries(
    [...workbench.spectra.getState().pins].map(([name, { counts }]) => [name, [...counts]]),
  );

describe('the spectra of pins', () => {
  it('are those of their pixels, wherever they are moved and undone to', async () => {
    const open = await openWorkbench(pinned);
    const { workbench, made, answered } = open;
    await answered();
    const before = { A: countsAt(made, pins[0]!), B: countsAt(made, pins[1]!) };
    expect(shown(open)).toEqual(before);
    const moved = { name: 'A', x: 5, y: 0 };
    workbench.recipe.edit('Move pin A', (recipe) => ({ ...recipe, pins: [moved] }));
    await answered();
    expect(shown(open)).toEqual({ A: countsAt(made, moved) });
    workbench.recipe.undo();
    await answered();
    expect(shown(open)).toEqual(before);
  });

  it('are read anew from another scan, and only where it has such a pixel', async () => {
    const open = await openWorkbench(pinned);
    await open.answered();
    const other = makeScan({ ny: 4, nx: 5, seed: 9 });
    await openOffered(open.workbench, other.inputs, pinned, '/other.npz');
    await open.answered();
    expect(shown(open)).toEqual({ A: countsAt(other, pins[0]!) });
    expect(open.workbench.notices.getState().notices).toEqual([]);
  });
});
