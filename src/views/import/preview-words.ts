/** What the pictures of the import sheet show, in words. */
import type { Preview } from '../../io/scan-plan';
import { formatCount } from '../../science/format';
import type { ScanMeta } from '../../science/scan';

/** "Counts in all channels, and the mean spectrum; one pixel in 4 rows and columns" */
export function previewInWords({ step }: Pick<Preview, 'step'>, meta: ScanMeta): string {
  const { nx, ny } = meta.shape;
  const { quantity } = meta;
  const isOne = nx * ny === 1;
  const named = quantity.replace(/^./, (first) => first.toUpperCase());
  const thinning = step > 1 ? `; one pixel in every ${step} rows and columns` : '';
  return isOne
    ? `${named} in each channel`
    : `${named} in all channels, and the mean spectrum${thinning}`;
}

/** The range of a spectrum: "0 to 36k counts" */
export function rangeInWords(low: number, high: number, quantity: string): string {
  return `${formatCount(low)} to ${formatCount(high)} ${quantity}`;
}
