import { describe, expect, it } from 'vitest';
import { isRimlightError } from '../../src/errors';
import { type AxisScale, channelEdges, recordAxis } from '../../src/science/axis';
import { laserEvFrom } from '../../src/science/laser';

const nm: AxisScale = { kind: 'wavelength', unit: 'nm', medium: 'vacuum' };

function refusal(values: readonly number[], scale: AxisScale): string {
  try {
    recordAxis(values, scale, 'scan.h5 · /axis');
  } catch (error) {
    if (isRimlightError(error)) {
      expect(error.kind).toBe('scan');
      expect(error.where).toBe('scan.h5 · /axis');
      expect(error.hint.length).toBeGreaterThan(10);
      return error.what;
    }
    throw error;
  }
  return 'not refused';
}

describe('recordAxis', () => {
  it('turns ascending wavelengths into ascending energies and says so', () => {
    const { energy, channels, isReversed } = recordAxis([500, 600, 700], nm, '');
    expect([...channels]).toEqual([2, 1, 0]);
    expect(isReversed).toBe(true);
    expect(energy.centresEv[0]).toBeLessThan(energy.centresEv[2]);
  });

  it('refuses repeated, turning, non-positive and short axes, naming the channel', () => {
    expect(refusal([500, 500, 501], nm)).toContain(
      'value 500 at two neighbouring channels, 0 and 1',
    );
    expect(refusal([500, 501, 500.5], nm)).toContain('ascends and then falls: 501 at channel 1');
    expect(refusal([3, 2, 2.5], nm)).toContain('descends and then rises: 2 at channel 1');
    expect(refusal([0, 1, 2], nm)).toContain('has 0 nm at channel 0');
    expect(refusal([-1, 1, 2], { kind: 'energy', unit: 'eV' })).toContain('has -1 eV at channel 0');
    expect(refusal([500], nm)).toContain('has one value');
    expect(refusal([500, Number.NaN], nm)).toContain('has one finite value of 2');
    expect(refusal([], nm)).toContain('has 0 values');
  });

  it('refuses a shift larger than the laser’s photon energy', () => {
    const scale: AxisScale = {
      kind: 'shift',
      unit: 'cm-1',
      laserEv: laserEvFrom({ value: 785, unit: 'nm' }, 'vacuum'),
    };
    expect(refusal([100, 13000], scale)).toContain('more than the laser');
    expect(recordAxis([-600, 0, 100], scale, '').energy.centresEv[2]).toBeGreaterThan(
      scale.laserEv,
    );
  });

  it('refuses wavelengths in air where there is none to speak of', () => {
    expect(refusal([150, 200], { ...nm, medium: 'air' })).toContain('opaque below 185 nm');
    expect(refusal([150, 200], nm)).toBe('not refused');
  });

  it('sees a value that repeats across a gap', () => {
    expect(refusal([500, Number.NaN, 500, 501], nm)).toContain('0 and 2');
  });
});

describe('channelEdges', () => {
  it('are midpoints in energy, the outermost mirrored', () => {
    expect([...channelEdges(Float64Array.of(1, 2, 4))]).toEqual([0.5, 1.5, 3, 5]);
  });
});

describe('laserEvFrom', () => {
  it('reads eV and cm-1 as they are and gives NaN for what cannot be', () => {
    expect(laserEvFrom({ value: 2.33, unit: 'eV' }, 'air')).toBe(2.33);
    expect(laserEvFrom({ value: 8065.543937, unit: 'cm-1' }, 'air')).toBeCloseTo(1, 9);
    expect(laserEvFrom({ value: 0, unit: 'nm' }, 'air')).toBeNaN();
    expect(laserEvFrom({ value: -532, unit: 'nm' }, 'vacuum')).toBeNaN();
  });
});
