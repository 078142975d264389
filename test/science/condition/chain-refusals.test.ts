import { describe, expect, it } from 'vitest';
import type { RimlightError } from '../../../src/errors';
import { planChain } from '../../../src/science/condition/chain';
import type { ChainStep } from '../../../src/science/condition/chain-step';
import { cube, grid, run, spectrum, steps } from './made-chain';

describe('a chain stops at the step that cannot be done, and names it', () => {
  it.each<[string, readonly ChainStep[]]>([
    ['condition[1], despike', [steps.offset, { ...steps.spectral, threshold: 0 }]],
    [
      'condition[0], offset',
      [{ ...steps.offset, dark: { ...spectrum(1, 'dark.npy'), shape: [47] } }],
    ],
    [
      'condition[1], response',
      [steps.crop, { ...steps.response, curve: { ...steps.response.curve, axis: [2, 3] } }],
    ],
    ['condition[0], calibrate', [{ ...steps.calibrate, degree: 1 }]],
    ['condition[0], farfield', [{ ...steps.farfield, window: null }]],
    ['condition[0], farfield', [{ ...steps.farfield, scale: -1 }]],
    ['condition[0], farfield', [{ ...steps.farfield, outside: { ...cube, shape: [12, 11, 48] } }]],
    [
      'condition[1], farfield',
      [steps.dark, { ...steps.farfield, outside: spectrum(3, 'out.npy') }],
    ],
    ['condition[0], baseline', [{ ...steps.baseline, smoothness: 0 }]],
    ['condition[1], crop', [steps.crop, steps.crop]],
    ['condition[0], bin', [{ ...steps.bin, k: 48 }]],
  ])('%s', (where, chain) => {
    let caught: unknown = null;
    try {
      planChain(chain, grid);
    } catch (error) {
      caught = error;
    }
    expect((caught as RimlightError).kind).toBe('recipe');
    expect((caught as RimlightError).where).toBe(where);
  });

  it.each<[string, readonly ChainStep[]]>([
    ['condition[1], denoise', [steps.offset, { ...steps.denoise, rank: 49 }]],
    ['condition[0], align-rows', [{ ...steps.align, maxShiftPx: 4 }]],
    [
      'condition[1], farfield',
      [steps.offset, { ...steps.farfield, outside: spectrum(20, 'out.npy') }],
    ],
  ])('%s, once its data are known', (where, chain) => {
    expect(() => run(chain)).toThrow(where);
  });
});
