/** Edits: what each changes, what follows it, what it shares, what it refuses. */
import { describe, expect, it } from 'vitest';
import { RimlightError } from '../../src/errors';
import { emptyRecipe } from '../../src/recipe/defaults';
import * as edits from '../../src/recipe/edits';
import type { Recipe } from '../../src/recipe/schema';
import { validateRecipe } from '../../src/recipe/validate';
import { contractRecipe } from './contract-recipe';

function ensureRecipe(value: unknown): Recipe {
  const result = validateRecipe(value);
  if (!result.ok) throw new Error(result.problems[0].message);
  return result.recipe;
}

const recipe = ensureRecipe({
  ...contractRecipe,
  blend: {
    mode: 'additive',
    channels: [
      { source: 'band.tail.integral', colour: '#ff5a4d' },
      { source: 'band.tail.centroid.err', colour: '#3fd07a' },
      { source: 'strain.pl', colour: '#4c8dff' },
      { source: 'scan.total', colour: '#ffffff' },
    ],
  },
  strain: {
    pl: {
      source: 'band.tail.centroid',
      unstrained: { region: 'flat' },
      gauge_meV_per_percent: -95,
    },
    height: { poisson: 0.22 },
  },
  features: { source: 'band.tail.integral' },
  pins: [
    { name: 'A', x: 1, y: 2 },
    { name: 'C', x: 3, y: 4, label: 'rim' },
  ],
});

const sourcesOf = ({ blend }: Recipe): readonly string[] =>
  (blend?.channels ?? []).map(({ source }) => source);

describe('bands', () => {
  it('an added band comes last, under the next free name', () => {
    const name = edits.nextBandName(emptyRecipe(''));
    expect(name).toBe('band-1');
    const once = edits.addBand(emptyRecipe(''), { name, from: 1.9, to: 2, unit: 'eV' });
    expect(edits.nextBandName(once)).toBe('band-2');
    expect(once.bands).toEqual([{ name: 'band-1', from: 1.9, to: 2, unit: 'eV' }]);
  });

  it('moving an edge leaves the other bands and blocks as the very same objects', () => {
    const moved = edits.moveBandEdge(recipe, 'tail', 'to', 1.93);
    expect(moved.bands?.[0]).toEqual({ ...recipe.bands?.[0], to: 1.93 });
    expect(moved.bands?.[1]).toBe(recipe.bands?.[1]);
    for (const block of ['scan', 'condition', 'model', 'blend', 'strain', 'pins'] as const) {
      expect(moved[block]).toBe(recipe[block]);
    }
  });

  it('an edit that changes nothing returns the recipe itself', () => {
    expect(edits.moveBandEdges(recipe, 'tail', 1.865, 1.925)).toBe(recipe);
    expect(edits.setBandFloor(recipe, 'tail', 'none')).toBe(recipe);
    expect(edits.renameBand(recipe, 'tail', 'tail')).toBe(recipe);
    expect(edits.moveBandEdges(recipe, 'nowhere', 1, 2)).toBe(recipe);
    expect(edits.removeBand(recipe, 'nowhere')).toBe(recipe);
    expect(edits.movePin(recipe, 'A', { x: 1, y: 2 })).toBe(recipe);
    expect(edits.labelPin(recipe, 'A', '')).toBe(recipe);
    expect(edits.setBlendMode(recipe, 'additive')).toBe(recipe);
    expect(edits.setTitle(recipe, recipe.title ?? '')).toBe(recipe);
    expect(edits.toggleStep(recipe, 99)).toBe(recipe);
  });

  it('a band cannot be dragged to no width', () => {
    expect(edits.moveBandEdge(recipe, 'tail', 'to', 1.865)).toBe(recipe);
  });

  it('renaming is followed in blend, strain and features', () => {
    const renamed = edits.renameBand(recipe, 'tail', 'rim-light');
    expect(sourcesOf(renamed)).toEqual([
      'band.rim-light.integral',
      'band.rim-light.centroid.err',
      'strain.pl',
      'scan.total',
    ]);
    expect(renamed.strain?.pl?.source).toBe('band.rim-light.centroid');
    expect(renamed.features?.source).toBe('band.rim-light.integral');
    expect(renamed.strain?.height).toBe(recipe.strain?.height);
    expect(renamed.blend?.channels[2]).toBe(recipe.blend?.channels[2]);
    expect(validateRecipe(renamed).ok).toBe(true);
  });

  it('renaming a band nothing refers to leaves the blend as it is', () => {
    expect(edits.renameBand(recipe, 'A1', 'A1g').blend).toBe(recipe.blend);
  });

  it('the capitals of a name can be changed', () => {
    expect(edits.renameBand(recipe, 'tail', 'Tail').bands?.[0].name).toBe('Tail');
  });

  it('removing takes along what was made from it, and what was made from that', () => {
    const removed = edits.removeBand(recipe, 'tail');
    expect(removed.bands?.map(({ name }) => name)).toEqual(['A1']);
    expect(sourcesOf(removed)).toEqual(['scan.total']);
    expect(removed.strain).toEqual({ height: { poisson: 0.22 } });
    expect('features' in removed).toBe(false);
    expect(removed.model).toBe(recipe.model);
  });

  it('what would break the recipe is refused with its place', () => {
    const band = { name: 'tail', from: 1, to: 2, unit: 'eV' } as const;
    const refusals: [() => Recipe, string][] = [
      [() => edits.addBand(recipe, band), 'bands[2].name'],
      [() => edits.addBand(recipe, { ...band, name: 'a.b' }), 'bands[2].name'],
      [() => edits.renameBand(recipe, 'A1', 'TAIL'), 'bands[1].name'],
      [() => edits.renameBand(recipe, 'A1', ''), 'bands[1].name'],
      [() => edits.moveBandEdge(recipe, 'tail', 'from', Number.NaN), 'bands[0].from'],
      [() => edits.moveBandEdge(recipe, 'tail', 'from', -1), 'bands[0].from'],
      [() => edits.setTitle(recipe, 'x'.repeat(2000)), 'title'],
      [() => edits.setScanChoices(recipe, { axis: { unit: 'furlong' } }), 'scan.axis.unit'],
      [() => edits.addPin(recipe, { name: 'A', x: 0, y: 0 }), 'pins[2].name'],
      [() => edits.movePin(recipe, 'C', { x: 0.5, y: 0 }), 'pins[1].x'],
      [() => edits.setBlendChannel(recipe, 1, { gamma: 0 }), 'blend.channels[1].gamma'],
      [() => edits.setBlendChannel(recipe, 1, { low: 5, high: 5 }), 'blend.channels[1].high'],
      [
        () => edits.addBlendChannel(recipe, { source: 'band.x.peak', colour: '#000000' }),
        'blend.channels[4].source',
      ],
      [
        () => edits.addRegion(recipe, { name: 'Flat', shape: 'ellipse', x: 0, y: 0, rx: 1, ry: 1 }),
        'regions[1].name',
      ],
    ];
    for (const [edit, where] of refusals) {
      let refusal: unknown;
      try {
        edit();
      } catch (error) {
        refusal = error;
      }
      expect(refusal).toBeInstanceOf(RimlightError);
      expect(refusal).toMatchObject({ kind: 'recipe', where });
    }
  });
});

describe('pins', () => {
  it('get the first free letter', () => {
    expect(edits.nextPinName(recipe)).toBe('B');
    const added = edits.addPin(recipe, { x: 7, y: 8 });
    expect(added.pins?.at(-1)).toEqual({ name: 'B', x: 7, y: 8 });
    expect(edits.nextPinName(added)).toBe('D');
  });

  it('go on with two letters after Z, up to ZZ', () => {
    let many = emptyRecipe('');
    const names: string[] = [];
    for (let n = 0; n < 702; n++) {
      many = edits.addPin(many, { x: n, y: 0 });
      names.push(many.pins?.at(-1)?.name ?? '');
    }
    expect(names.slice(24, 29)).toEqual(['Y', 'Z', 'AA', 'AB', 'AC']);
    expect(names.at(-1)).toBe('ZZ');
    expect(new Set(names).size).toBe(702);
    expect(validateRecipe(many).ok).toBe(true);
    expect(() => edits.addPin(many, { x: 0, y: 0 })).toThrow(/at most 702 pins/);
  });

  it('are moved, labelled and removed without touching anything else', () => {
    const moved = edits.movePin(recipe, 'C', { x: 9, y: 9 });
    expect(moved.pins?.[1]).toEqual({ name: 'C', x: 9, y: 9, label: 'rim' });
    expect(edits.labelPin(recipe, 'C', '').pins?.[1]).toEqual({ name: 'C', x: 3, y: 4 });
    expect(edits.labelPin(recipe, 'A', 'flat').pins?.[0].label).toBe('flat');
    const removed = edits.removePin(recipe, 'A');
    expect(removed.pins).toEqual([recipe.pins?.[1]]);
    expect(removed.bands).toBe(recipe.bands);
  });
});

describe('the blend', () => {
  it('begins with its first channel and goes with its last', () => {
    const begun = edits.addBlendChannel(emptyRecipe(''), {
      source: 'scan.total',
      colour: '#ffffff',
    });
    expect(begun.blend?.mode).toBe('additive');
    expect('blend' in edits.removeBlendChannel(begun, 0)).toBe(false);
  });

  it('has six channels at most', () => {
    const channel = { source: 'scan.total', colour: '#ffffff' } as const;
    const six = [4, 5].reduce((one) => edits.addBlendChannel(one, channel), recipe);
    expect(() => edits.addBlendChannel(six, channel)).toThrow(/at most 6/);
  });

  it('changes the fields given of one channel', () => {
    const changed = edits.setBlendChannel(recipe, 0, { low: 'p5', gamma: 0.7 });
    expect(changed.blend?.channels[0]).toEqual({
      source: 'band.tail.integral',
      colour: '#ff5a4d',
      low: 'p5',
      gamma: 0.7,
    });
    expect(changed.blend?.channels[1]).toBe(recipe.blend?.channels[1]);
    expect(edits.setBlendMode(recipe, 'screen').blend?.mode).toBe('screen');
  });
});

describe('steps, regions and the scan block', () => {
  it('a step is switched off and on again', () => {
    const off = edits.toggleStep(recipe, 1);
    expect(off.condition?.[1]).toEqual({ step: 'offset', counts: 300, off: true });
    expect(edits.toggleStep(off, 1)).toEqual(recipe);
    expect(off.condition?.[0]).toBe(recipe.condition?.[0]);
  });

  it('a removed region takes along the strain that needed it', () => {
    const removed = edits.removeRegion(recipe, 'flat');
    expect(removed.strain?.pl).toBeUndefined();
    expect(sourcesOf(removed)).not.toContain('strain.pl');
    expect(validateRecipe(removed).ok).toBe(true);
  });

  it('a region is drawn anew under its name', () => {
    const shape = { name: 'other', shape: 'ellipse', x: 5, y: 5, rx: 2, ry: 2 } as const;
    const drawn = edits.replaceRegion(recipe, 'flat', shape);
    expect(drawn.regions).toEqual([{ ...shape, name: 'flat' }]);
    expect(edits.nextRegionName(drawn)).toBe('region-1');
    expect(edits.addRegion(drawn, { ...shape, name: 'region-1' }).regions).toHaveLength(2);
  });

  it('stated choices are laid over the scan block', () => {
    const stated = edits.setScanChoices(recipe, { serpentine: true, axis: { medium: 'vacuum' } });
    expect(stated.scan?.serpentine).toBe(true);
    expect(stated.scan?.axis).toEqual({ ...recipe.scan?.axis, medium: 'vacuum' });
    expect(stated.scan?.laser).toBe(recipe.scan?.laser);
  });
});
