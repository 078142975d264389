/** The lead map: which are offered, limits they start with, stepping through them. */
import { describe, expect, it } from 'vitest';
import {
  setLeadLimits,
  showLeadMap,
  stepLeadMap,
  toggleLeadError,
} from '../../src/state/lead-actions';
import { choiceOf, leadChoices } from '../../src/state/lead-choices';
import { idleWorkbench, rowMap } from './idle-workbench';

const started = () => {
  const workbench = idleWorkbench({
    bands: [{ name: 'tail', from: 1.8, to: 1.9, unit: 'eV' }],
  });
  workbench.results.put([rowMap('scan.total', [1, 2, 3]), rowMap('band.tail.integral', [1, 2, 3])]);
  return workbench;
};

describe('the lead map', () => {
  it('is chosen from the scan’s known maps and all maps of each band', () => {
    const workbench = started();
    const { recipe } = workbench.recipe.getState();
    const groups = leadChoices(recipe, workbench.results.getState().maps);
    expect(groups.map(({ title, maps }) => [title, maps.map(({ name }) => name)])).toEqual([
      ['Scan', ['scan.total']],
      [
        'Band tail',
        ['integral', 'centroid', 'median', 'spread', 'peak', 'peak_at'].map(
          (quantity) => `band.tail.${quantity}`,
        ),
      ],
    ]);
    expect(choiceOf(groups, 'band.tail.centroid.err')?.title).toBe(
      'Centroid of band tail, uncertainty',
    );
    expect(choiceOf(groups, 'band.gone.centroid')).toBeNull();
  });

  it('starts with narrow percentiles for energies and wide ones for counts', () => {
    const workbench = started();
    showLeadMap(workbench, 'band.tail.centroid');
    expect(workbench.view.getState()).toMatchObject({ leadLow: 'p2', leadHigh: 'p98' });
    showLeadMap(workbench, 'band.tail.integral');
    expect(workbench.view.getState()).toMatchObject({ leadLow: 'p0.5', leadHigh: 'p99.5' });
  });

  it('keeps limits the user set until another map is shown', () => {
    const workbench = started();
    showLeadMap(workbench, 'band.tail.integral');
    setLeadLimits(workbench, { low: 1, high: 2 }, 'low');
    showLeadMap(workbench, 'band.tail.integral');
    expect(workbench.view.getState()).toMatchObject({ leadLow: 1, leadHigh: 2 });
    setLeadLimits(workbench, { low: 3, high: 2 }, 'low');
    expect(workbench.view.getState()).toMatchObject({ leadLow: 1, leadHigh: 2 });
  });

  it('is stepped through in the order of the list, round its end', () => {
    const workbench = started();
    stepLeadMap(workbench, -1);
    expect(workbench.view.getState().leadMap).toBe('band.tail.peak_at');
    stepLeadMap(workbench, 1);
    stepLeadMap(workbench, 1);
    expect(workbench.view.getState().leadMap).toBe('band.tail.integral');
  });

  it('changes places with its uncertainty', () => {
    const workbench = started();
    showLeadMap(workbench, 'band.tail.integral');
    toggleLeadError(workbench);
    expect(workbench.view.getState().leadMap).toBe('band.tail.integral.err');
    toggleLeadError(workbench);
    expect(workbench.view.getState().leadMap).toBe('band.tail.integral');
  });

  it('moves no number: the recipe stays untouched', () => {
    const workbench = started();
    showLeadMap(workbench, 'band.tail.centroid');
    toggleLeadError(workbench);
    expect(workbench.recipe.getState().past).toEqual([]);
  });
});
