import { describe, expect, it } from 'vitest';
import { shownPitch } from '../../../src/views/import/shown-pitch';
import { spectrumPath } from '../../../src/views/import/spectrum-path';

const box = { widthPx: 100, heightPx: 50 };

describe('the line of the mean spectrum', () => {
  it('runs from edge to edge, the least counts at the bottom and the greatest at the top', () => {
    const { d, low, high } = spectrumPath(
      Float64Array.of(1, 1.5, 2),
      Float64Array.of(10, 30, 20),
      box,
    );
    expect(d).toBe('M0.0 50.0L50.0 0.0L100.0 25.0');
    expect([low, high]).toEqual([10, 30]);
  });

  it('keeps a spike one channel wide among ten thousand', () => {
    const nk = 10_000;
    const centresEv = Float64Array.from({ length: nk }, (_, k) => 1 + k / nk);
    const counts = new Float64Array(nk).fill(5);
    counts[4321] = 905;
    const { d, high } = spectrumPath(centresEv, counts, box);
    expect(high).toBe(905);
    expect(d).toMatch(/[ML][\d.]+ 0\.0/);
    expect(d.split('L').length).toBeLessThan(2 * box.widthPx + 4);
  });

  it('breaks where there is no data', () => {
    const { d } = spectrumPath(Float64Array.of(1, 1.5, 2), Float64Array.of(1, Number.NaN, 2), box);
    expect(d).toBe('M0.0 50.0M100.0 0.0');
  });

  it('is empty without any data', () => {
    const { d, low, high } = spectrumPath(
      Float64Array.of(1, 2),
      new Float64Array(2).fill(NaN),
      box,
    );
    expect([d, low, high]).toEqual(['', Number.NaN, Number.NaN]);
  });
});

describe('the pitch as it is shown', () => {
  it('is in µm from a micrometre on, without stray digits', () => {
    expect(shownPitch({ x: 1100, y: 1500, unit: 'nm' })).toEqual({ x: 1.1, y: 1.5, unit: 'um' });
    expect(shownPitch({ x: 100_000, y: 100_000, unit: 'nm' }).x).toBe(100);
  });

  it('stays in nm where one way is finer, and in the unit the user gave', () => {
    expect(shownPitch({ x: 15, y: 1500, unit: 'nm' }).unit).toBe('nm');
    expect(shownPitch({ x: 2, y: 2, unit: 'mm' })).toEqual({ x: 2, y: 2, unit: 'mm' });
  });
});
