import { describe, expect, it } from 'vitest';
import type { ScanMeta } from '../../../src/science/scan';
import { previewInWords, rangeInWords } from '../../../src/views/import/preview-words';

const meta = (nx: number, ny: number, quantity: string): ScanMeta => ({
  name: 'scan',
  shape: { nx, ny, nk: 3 },
  quantity,
  axis: { centresEv: Float64Array.of(1, 2, 3), edgesEv: Float64Array.of(0.5, 1.5, 2.5, 3.5) },
  x: { label: 'x', unit: 'px', isLength: false, pitch: 1, values: null },
  y: { label: 'y', unit: 'px', isLength: false, pitch: 1, values: null },
  laserEv: null,
  exposureS: null,
  noise: { kind: 'none' },
});

describe('the caption of the preview', () => {
  it('names the quantity of the scan', () => {
    expect(previewInWords({ step: 1 }, meta(8, 8, 'absorbance'))).toBe(
      'Absorbance in all channels, and the mean spectrum',
    );
  });

  it('says that pixels are left out', () => {
    expect(previewInWords({ step: 4 }, meta(8, 8, 'counts'))).toMatch(/one pixel in every 4 rows/);
  });

  it('speaks of no mean where there is one spectrum', () => {
    expect(previewInWords({ step: 1 }, meta(1, 1, 'counts'))).toBe('Counts in each channel');
  });

  it('gives the range of the line', () => {
    expect(rangeInWords(0, 36_000, 'counts')).toBe('0 to 36k counts');
  });
});
