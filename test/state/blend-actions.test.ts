/** The blend's settings: valid edits, drags of one step, limits that never cross. */
import { describe, expect, it } from 'vitest';
import {
  addChannel,
  canAddChannel,
  removeChannel,
  setChannelColour,
  setChannelGamma,
  setChannelLimits,
  setChannelSource,
  setMixing,
} from '../../src/state/blend-actions';
import { idleWorkbench, rowMap } from './idle-workbench';

const bands = ['tail', 'exciton'].map((name, i) => ({
  name,
  from: 1.8 + i / 10,
  to: 1.85 + i / 10,
  unit: 'eV' as const,
}));
const started = () => {
  const workbench = idleWorkbench({
    bands,
    blend: { mode: 'additive', channels: [{ source: 'band.tail.integral', colour: '#ff5a4d' }] },
  });
  const channels = () => workbench.recipe.getState().recipe.blend?.channels ?? [];
  const steps = () => workbench.recipe.getState().past.length;
  return { workbench, channels, steps };
};

describe('channels of the blend', () => {
  it('are added for bands that have none, each in a new colour, up to six', () => {
    const { workbench, channels } = started();
    addChannel(workbench);
    expect(channels()[1]).toEqual({ source: 'band.exciton.integral', colour: '#3fd07a' });
    for (let more = 0; more < 4; more++) addChannel(workbench);
    expect(new Set(channels().map(({ colour }) => colour)).size).toBe(6);
    expect(canAddChannel(workbench.recipe.getState().recipe)).toBe(false);
    addChannel(workbench);
    expect(channels()).toHaveLength(6);
    expect(workbench.notices.getState().notices[0]?.tone).toBe('error');
  });

  it('begin a blend where there is none', () => {
    const workbench = idleWorkbench({});
    addChannel(workbench);
    expect(workbench.recipe.getState().recipe.blend).toEqual({
      mode: 'additive',
      channels: [{ source: 'scan.total', colour: '#ff5a4d' }],
    });
  });

  it('come back after they were removed', () => {
    const { workbench, channels } = started();
    removeChannel(workbench, 0);
    expect(channels()).toEqual([]);
    workbench.notices.getState().notices[0]!.action!.run();
    expect(channels()).toHaveLength(1);
  });

  it('make one step of a drag, and another of the next', () => {
    const { workbench, channels, steps } = started();
    for (const gamma of [1.1, 1.2, 1.3]) setChannelGamma(workbench, 0, gamma);
    workbench.recipe.endGesture();
    for (const colour of ['#ff0000', '#fe0000']) setChannelColour(workbench, 0, colour);
    workbench.recipe.endGesture();
    expect(channels()[0]).toMatchObject({ gamma: 1.3, colour: '#fe0000' });
    expect(steps()).toBe(2);
    workbench.recipe.undo();
    expect(channels()[0]).toMatchObject({ gamma: 1.3, colour: '#ff5a4d' });
  });

  it('make no step of what changes nothing', () => {
    const { workbench, steps } = started();
    setChannelGamma(workbench, 0, 1);
    setChannelLimits(workbench, 0, { low: 'p1', high: 'p99.5' }, 'low');
    setChannelSource(workbench, 0, 'band.tail.integral');
    setMixing(workbench, 'additive');
    expect(steps()).toBe(0);
  });

  it('stop a limit before the other', () => {
    const { workbench, channels } = started();
    setChannelLimits(workbench, 0, { low: 'p1', high: 'p0.2' }, 'high');
    expect(channels()[0]).toMatchObject({ low: 'p1', high: 'p1.1' });
  });

  it('refuse a number that lies above the percentile it is to stay below', () => {
    const { workbench, channels } = started();
    workbench.results.put([rowMap('band.tail.integral', [0, 10, 20, 30, 40])]);
    setChannelLimits(workbench, 0, { low: 41, high: 'p100' }, 'low');
    expect(channels()[0]?.low).toBeUndefined();
    setChannelLimits(workbench, 0, { low: 39, high: 'p100' }, 'low');
    expect(channels()[0]).toMatchObject({ low: 39, high: 'p100' });
  });

  it('keep limits of the same unit and drop those of another when the map changes', () => {
    const { workbench, channels } = started();
    setChannelLimits(workbench, 0, { low: 100, high: 900 }, 'high');
    setChannelSource(workbench, 0, 'band.exciton.peak');
    expect(channels()[0]).toMatchObject({ low: 100, high: 900 });
    setChannelSource(workbench, 0, 'band.exciton.centroid');
    expect(channels()[0]).toMatchObject({ low: 'p1', high: 'p99.5' });
  });

  it('never take a map the recipe does not make', () => {
    const { workbench, channels } = started();
    setChannelSource(workbench, 0, 'band.ghost.integral');
    expect(channels()[0]?.source).toBe('band.tail.integral');
    expect(workbench.notices.getState().notices[0]?.text).toMatch(/ghost/);
  });
});
