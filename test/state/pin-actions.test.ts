/** Pins: one edit each, a drag one step, nothing lost without an undo. */
import { describe, expect, it } from 'vitest';
import {
  addPinAt,
  labelPinAs,
  movePinTo,
  removePin,
  togglePinAt,
} from '../../src/state/pin-actions';
import { idleWorkbench } from './idle-workbench';

describe('pins', () => {
  it('are lettered as they are made, and a pixel is pinned once', () => {
    const workbench = idleWorkbench({});
    addPinAt(workbench, { y: 3, x: 4 });
    addPinAt(workbench, { y: 3, x: 4 });
    addPinAt(workbench, { y: 0, x: 0 });
    const { recipe, past } = workbench.recipe.getState();
    expect(recipe.pins).toEqual([
      { x: 4, y: 3, name: 'A' },
      { x: 0, y: 0, name: 'B' },
    ]);
    expect(past).toHaveLength(2);
  });

  it('are let go by a second press, which the notice takes back', () => {
    const workbench = idleWorkbench({});
    togglePinAt(workbench, { y: 1, x: 2 });
    togglePinAt(workbench, { y: 1, x: 2 });
    expect(workbench.recipe.getState().recipe.pins).toEqual([]);
    const [notice] = workbench.notices.getState().notices;
    notice!.action!.run();
    expect(workbench.recipe.getState().recipe.pins).toEqual([{ x: 2, y: 1, name: 'A' }]);
  });

  it('say nothing when there was none to let go', () => {
    const workbench = idleWorkbench({});
    removePin(workbench, 'Q');
    expect(workbench.notices.getState().notices).toEqual([]);
    expect(workbench.recipe.getState().past).toEqual([]);
  });

  it('move in one step of the history, never onto one another', () => {
    const workbench = idleWorkbench({
      pins: [
        { name: 'A', x: 0, y: 0 },
        { name: 'B', x: 5, y: 5 },
      ],
    });
    for (let at = 1; at <= 5; at++) movePinTo(workbench, 'A', { y: at, x: at });
    workbench.recipe.endGesture();
    const { recipe, past } = workbench.recipe.getState();
    expect(recipe.pins?.[0]).toEqual({ name: 'A', x: 4, y: 4 });
    expect(past).toHaveLength(1);
  });

  it('carry words, and lose them with an empty text', () => {
    const workbench = idleWorkbench({ pins: [{ name: 'A', x: 0, y: 0 }] });
    labelPinAs(workbench, 'A', 'rim');
    expect(workbench.recipe.getState().recipe.pins?.[0]?.label).toBe('rim');
    labelPinAs(workbench, 'A', '');
    expect(workbench.recipe.getState().recipe.pins?.[0]).toEqual({ name: 'A', x: 0, y: 0 });
  });

  it('tell of words that are too long instead of taking them', () => {
    const workbench = idleWorkbench({ pins: [{ name: 'A', x: 0, y: 0 }] });
    labelPinAs(workbench, 'A', 'x'.repeat(500));
    expect(workbench.recipe.getState().recipe.pins?.[0]?.label).toBeUndefined();
    expect(workbench.notices.getState().notices[0]?.tone).toBe('error');
  });
});
