import { describe, expect, it } from 'vitest';
import type { Guess } from '../../../src/io/scan-plan';
import { controlsOf } from '../../../src/views/import/guess-controls';

const guess = (given: Partial<Guess>): Guess => ({
  field: 'data',
  label: 'counts',
  source: 'file',
  evidence: 'the only array',
  alternatives: [],
  ...given,
});
const alternatives = [{ label: 'vacuum', evidence: '', choice: {} }];

describe('the controls of a guess', () => {
  it('are plain words where there is nothing to choose and nothing to type', () => {
    expect(controlsOf(guess({ field: 'unit' }), {})).toEqual({
      hasList: false,
      numbers: null,
      hasLabel: true,
    });
  });

  it('are a list where there are alternatives', () => {
    const medium = guess({ field: 'medium', source: 'guess', alternatives });
    expect(controlsOf(medium, {})).toEqual({ hasList: true, numbers: null, hasLabel: false });
  });

  it.each(['laser', 'pixel', 'exposure'] as const)(
    'are fields for a %s that is not known',
    (field) => {
      for (const source of ['missing', 'absent'] as const) {
        const { numbers, hasLabel } = controlsOf(guess({ field, source }), {});
        expect(numbers).toBe(field);
        expect(hasLabel).toBe(false);
      }
    },
  );

  it('are fields for a laser found in the file, so that it can be corrected', () => {
    const known = { laser: { value: 785, unit: 'nm' } } as const;
    expect(controlsOf(guess({ field: 'laser' }), known).numbers).toBe('laser');
  });

  it('show a step in volts as it is: it is no length to be typed', () => {
    const volts = guess({ field: 'pixel', label: '0.05 V along x (gate volts)' });
    expect(controlsOf(volts, {})).toEqual({ hasList: false, numbers: null, hasLabel: true });
  });

  it('show what was found even while the scan cannot be read and no field holds it', () => {
    expect(controlsOf(guess({ field: 'laser', label: '532 nm' }), {}).hasLabel).toBe(true);
  });

  it('ask for the ends of an axis the file has not, and leave them to be corrected', () => {
    expect(controlsOf(guess({ field: 'axis', source: 'missing' }), {}).numbers).toBe('axis');
    const stated = { axis: { from: 1010, to: 1766, kind: 'shift', unit: 'cm-1' } } as const;
    expect(controlsOf(guess({ field: 'axis', source: 'stated' }), stated).numbers).toBe('axis');
    expect(controlsOf(guess({ field: 'axis' }), { axis: { data: 'nm' } }).numbers).toBeNull();
  });

  it('hold the detector’s numbers once there is a detector', () => {
    const noise = guess({ field: 'noise', alternatives });
    expect(controlsOf(noise, {}).numbers).toBeNull();
    expect(controlsOf(noise, { detector: { offset_counts: 300 } }).numbers).toBe('detector');
  });
});
