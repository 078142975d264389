/** One thing wrong in what a recipe makes of a scan. */
import { describe, expect, it } from 'vitest';
import { formatProblem, type RecipeProblem } from '../../src/recipe/problems';
import type { Spoilable } from './contract-recipe';
import { set, spoiled } from './spoiled-recipe';

describe('one thing wrong', () => {
  it.each<[string, (recipe: Spoilable) => void, Partial<RecipeProblem>]>([
    [
      'a parameter of another shape',
      (r) => set(r.model.components[1], { tail: 0.03 }),
      { path: 'model.components[1].tail' },
    ],
    [
      'a share above one',
      (r) => set(r.model.components[1], { shape: 'pseudo-voigt', eta: 1.5 }),
      { path: 'model.components[1].eta' },
    ],
    [
      'a tie to nothing',
      (r) => set(r.model.components[2], { centre: { tie: { to: 'exciton.center' } } }),
      { path: 'model.components[2].centre.tie.to', nearest: 'exciton.centre' },
    ],
    [
      'an empty model',
      (r) => {
        set(r.model, { components: [] });
        Reflect.deleteProperty(r, 'strain');
      },
      { path: 'model.components' },
    ],
    [
      'seven channels',
      (r) => set(r.blend, { channels: Array(7).fill(r.blend.channels[0]) }),
      { path: 'blend.channels', expected: 'a list of at most 6 entries' },
    ],
    [
      'a colour by name',
      (r) => set(r.blend.channels[0], { colour: 'red' }),
      { path: 'blend.channels[0].colour' },
    ],
    [
      'a percentile above 100',
      (r) => set(r.blend.channels[0], { high: 'p101' }),
      { path: 'blend.channels[0].high' },
    ],
    [
      'limits the wrong way round',
      (r) => set(r.blend.channels[0], { low: 5, high: 3 }),
      { path: 'blend.channels[0].high' },
    ],
    [
      'a low percentile above the high default',
      (r) =>
        set(r.blend, { channels: [{ source: 'scan.total', colour: '#ffffff', low: 'p99.9' }] }),
      { path: 'blend.channels[0].low' },
    ],
    [
      'no gamma',
      (r) => set(r.blend.channels[0], { gamma: 0 }),
      { path: 'blend.channels[0].gamma' },
    ],
    [
      'a map of a band that is not there',
      (r) => set(r.blend.channels[0], { source: 'band.tial.integral' }),
      { path: 'blend.channels[0].source', nearest: 'band.tail.integral' },
    ],
    [
      'a map of no pattern',
      (r) => set(r.features, { source: 'scan.hieght' }),
      { path: 'features.source', nearest: 'scan.height' },
    ],
    [
      'a parameter the component does not report',
      (r) => set(r.blend.channels[0], { source: 'fit.exciton.needed' }),
      { path: 'blend.channels[0].source' },
    ],
    [
      'an error map of a map without one',
      (r) => set(r.blend.channels[0], { source: 'scan.height.err' }),
      { path: 'blend.channels[0].source', nearest: 'scan.height' },
    ],
    [
      'a region that is not there',
      (r) => set(r.strain.raman, { unstrained: { region: 'falt' } }),
      { path: 'strain.raman.unstrained.region', nearest: 'flat' },
    ],
    [
      'strain from counts',
      (r) => set(r.strain.pl, { source: 'band.tail.integral' }),
      { path: 'strain.pl.source' },
    ],
    [
      'strain from strain',
      (r) => set(r.strain.pl, { source: 'strain.raman' }),
      { path: 'strain.pl.source' },
    ],
    [
      'a gauge of zero',
      (r) => set(r.strain.pl, { gauge_meV_per_percent: 0 }),
      { path: 'strain.pl.gauge_meV_per_percent' },
    ],
    [
      'an unstrained energy in the wrong capitals',
      (r) => set(r.strain.pl, { unstrained: { ev: 2 } }),
      { path: 'strain.pl.unstrained.ev', nearest: 'eV' },
    ],
    [
      'a ratio no material has',
      (r) => set(r.strain.height, { poisson: 0.6 }),
      { path: 'strain.height.poisson' },
    ],
    [
      'a uniaxial state without its ratio',
      (r) => {
        set(r.strain.raman, { state: 'uniaxial' });
        Reflect.deleteProperty(r.strain.raman, 'poisson');
      },
      { path: 'strain.raman.poisson' },
    ],
    [
      'a small letter for a pin',
      (r) => set(r, { pins: [{ name: 'a', x: 0, y: 0 }] }),
      { path: 'pins[0].name' },
    ],
    [
      'a pin twice',
      (r) =>
        set(r, {
          pins: [
            { name: 'A', x: 0, y: 0 },
            { name: 'A', x: 1, y: 0 },
          ],
        }),
      { path: 'pins[1].name' },
    ],
    [
      'a pin off the scan',
      (r) => set(r, { pins: [{ name: 'A', x: -1, y: 0 }] }),
      { path: 'pins[0].x' },
    ],
    [
      'a mask of the wrong size',
      (r) => set(r, { regions: [{ name: 'flat', shape: 'mask', nx: 3, ny: 3, rle: [4, 4] }] }),
      { path: 'regions[0].rle' },
    ],
    [
      'a mask without size',
      (r) => set(r, { regions: [{ name: 'flat', shape: 'mask', nx: 3, rle: [9] }] }),
      { path: 'regions[0].ny' },
    ],
    [
      'an endless number',
      (r) => set(r.scan, { exposure_s: Number.POSITIVE_INFINITY }),
      { path: 'scan.exposure_s', expected: 'a finite number' },
    ],
    [
      'a field left undefined',
      (r) => set(r.bands[0], { floor: undefined }),
      { path: 'bands[0].floor' },
    ],
  ])('is told of %s, and nothing else', (_, change, expected) => {
    const told = spoiled(change);
    expect(told.map(formatProblem)).toHaveLength(1);
    expect(told[0]).toMatchObject(expected);
  });
});
