import { describe, expect, it } from 'vitest';
import { channelEdges } from '../../src/science/axis';
import type { PositionAxis, ScanMeta } from '../../src/science/scan';
import { evFromNm } from '../../src/science/units';
import { energyInWords, placeInWords, scanInWords } from '../../src/state/cursor-place';

const centresEv = Float64Array.of(1.8, 1.9, 2);

const nm = (pitch: number): PositionAxis => ({
  label: 'x',
  unit: 'nm',
  isLength: true,
  pitch,
  values: null,
});

const meta = (x: PositionAxis, y: PositionAxis, laserEv: number | null = null): ScanMeta => ({
  name: 'made.npy',
  shape: { ny: 48, nx: 96, nk: 3 },
  axis: { centresEv, edgesEv: channelEdges(centresEv) },
  x,
  y,
  laserEv,
  exposureS: null,
  noise: { kind: 'poisson' },
  quantity: 'counts',
});

describe('the place under the cursor', () => {
  it('is a length from the first pixel where the pitch is known', () => {
    expect(placeInWords(meta(nm(15), nm(20)), { x: 41, y: 2 })).toBe('x 615 nm  y 40 nm');
    expect(placeInWords(meta(nm(150), nm(15)), { x: 41, y: 0 })).toBe('x 6.15 µm  y 0 nm');
  });

  it('is a pixel where it is not, and a voltage where the axis is one', () => {
    const px: PositionAxis = { label: 'y', unit: 'px', isLength: false, pitch: 1, values: null };
    const gate: PositionAxis = {
      label: 'gate',
      unit: 'V',
      isLength: false,
      pitch: 0.5,
      values: Float64Array.of(-1, -0.5, 0.25),
    };
    expect(placeInWords(meta(gate, px), { x: 2, y: 7 })).toBe('gate 0.2500 V  y 7');
  });
});

describe('a photon energy', () => {
  it('is told in eV, in nm of the medium, and as the shift from the laser', () => {
    // Hg e-line: 546.0735 nm in air, 546.2253 nm in vacuum (NIST ASD), 514.5 nm argon laser.
    const energyEv = evFromNm(546.2253);
    expect(energyInWords(energyEv, null, 'air')).toBe(`${energyEv.toFixed(4)} eV · 546.1 nm`);
    expect(energyInWords(energyEv, null, 'vacuum')).toBe(`${energyEv.toFixed(4)} eV · 546.2 nm`);
    const shift = Math.round(1e7 / 514.5 - 1e7 / 546.2253);
    expect(energyInWords(energyEv, evFromNm(514.5), 'air')).toContain(` · ${shift} cm⁻¹`);
  });

  it('above the laser has a negative shift, written with a true minus', () => {
    expect(energyInWords(evFromNm(500), evFromNm(514.5), 'vacuum')).toContain(' · −564 cm⁻¹');
  });

  it('that is none says nothing', () => {
    expect(energyInWords(0, null, 'air')).toBe('');
    expect(energyInWords(Number.NaN, null, 'air')).toBe('');
  });
});

describe('a scan in words', () => {
  it('names its pixels, pitch, channels and laser', () => {
    expect(scanInWords(meta(nm(15), nm(15), evFromNm(633)), 'vacuum')).toBe(
      '96 × 48 px · 15 nm/px · 3 ch · 633.0 nm',
    );
    expect(scanInWords(meta(nm(15), nm(30)), 'air')).toBe('96 × 48 px · 15 nm × 30 nm/px · 3 ch');
  });
});
