import { describe, expect, it } from 'vitest';
import { deleteBand, setFloor } from '../../src/state/band-actions';
import type { Notice } from '../../src/state/notices';
import type { Workbench } from '../../src/state/workbench';
import { idleWorkbench } from './idle-workbench';

const bands = [
  { name: 'low', from: 1.82, to: 1.88, unit: 'eV' as const },
  { name: 'high', from: 1.9, to: 1.95, unit: 'eV' as const },
];

const said = ({ notices }: Workbench): readonly Notice[] => notices.getState().notices;

describe('a message that offers an undo', () => {
  it('takes back what it tells of, and goes', () => {
    const workbench = idleWorkbench({ bands });
    deleteBand(workbench, 'low');
    const [notice] = said(workbench);
    expect(notice?.text).toBe('Band low was deleted.');
    notice?.action?.run();
    expect(workbench.recipe.getState().recipe.bands).toEqual(bands);
    expect(said(workbench)).toEqual([]);
  });

  it('goes with the next edit, which its undo would take back instead', () => {
    const workbench = idleWorkbench({ bands });
    deleteBand(workbench, 'low');
    setFloor(workbench, 'high', 'ends');
    expect(said(workbench)).toEqual([]);
  });

  it('is that of the newest of two deletions', () => {
    const workbench = idleWorkbench({ bands });
    deleteBand(workbench, 'low');
    deleteBand(workbench, 'high');
    expect(said(workbench).map(({ text }) => text)).toEqual(['Band high was deleted.']);
    said(workbench)[0]?.action?.run();
    expect(workbench.recipe.getState().recipe.bands).toEqual([bands[1]]);
  });
});
