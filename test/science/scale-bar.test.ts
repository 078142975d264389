/** Scale bars: round, never too long, never short. */
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { mostShare, planScaleBar } from '../../src/science/scale-bar';
import type { PositionAxis } from '../../src/science/scan';

function lengthAxis(pitch: number): PositionAxis {
  return { label: 'x', unit: 'nm', isLength: true, pitch, values: null };
}

describe('planScaleBar', () => {
  it.each([
    // 96 pixels of 15 nm are 1440 nm, 0.4 of which is 576 nm
    [15, 96, 500, '500 nm'],
    [250, 64, 5000, '5 µm'],
    [0.32, 100, 10, '10 nm'],
    [2e6, 10, 5e6, '5 mm'],
    // exactly 0.4 of the width is taken
    [10, 50, 200, '200 nm'],
    [0.001, 20, 0.005, '0.005 nm'],
  ])('of a pitch of %d nm and %d pixels is %d nm long', (pitch, pixels, lengthNm, label) => {
    const bar = planScaleBar(lengthAxis(pitch), pixels)!;
    expect(bar.lengthNm).toBe(lengthNm);
    expect(bar.label).toBe(label);
    expect(bar.share).toBeCloseTo(lengthNm / (pitch * pixels), 12);
  });

  it('takes from 0.16 to 0.4 of any width, in 1, 2 or 5 times a power of ten', () => {
    const pitch = fc.double({ min: 1e-3, max: 1e6, noNaN: true });
    const pixels = fc.double({ min: 1, max: 5000, noNaN: true });
    fc.assert(
      fc.property(pitch, pixels, (pitchNm, across) => {
        const bar = planScaleBar(lengthAxis(pitchNm), across)!;
        expect(bar.share).toBeLessThanOrEqual(mostShare * (1 + 1e-12));
        expect(bar.share).toBeGreaterThan(0.16 * (1 - 1e-12));
        expect(['1', '2', '5']).toContain(bar.lengthNm.toExponential().split('e')[0]);
      }),
    );
  });

  it('is none where the pitch is unknown or is a voltage', () => {
    const volts = { ...lengthAxis(0.1), unit: 'V', isLength: false };
    const pixels = { ...lengthAxis(1), unit: 'px', isLength: false };
    expect(planScaleBar(volts, 100)).toBeNull();
    expect(planScaleBar(pixels, 100)).toBeNull();
    expect(planScaleBar(lengthAxis(15), 0)).toBeNull();
  });
});
