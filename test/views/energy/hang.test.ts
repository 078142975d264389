import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { hangTiles } from '../../../src/views/energy/hang';

describe('tiles over their bands', () => {
  it('keep their order, do not overlap and stay within the panel', () => {
    const centres = fc.array(fc.double({ min: 0, max: 900, noNaN: true }), {
      minLength: 1,
      maxLength: 9,
    });
    fc.assert(
      fc.property(centres, (unsorted) => {
        const centresPx = [...unsorted].sort((a, b) => a - b);
        const lefts = hangTiles({ centresPx, slotPx: 100, fromPx: 0, toPx: 900 });
        expect(lefts).toHaveLength(centresPx.length);
        for (const [index, left] of lefts.entries()) {
          expect(left).toBeGreaterThanOrEqual(-1e-9);
          expect(left + 100).toBeLessThanOrEqual(900 + 1e-9);
          if (index > 0) expect(left - (lefts[index - 1] ?? 0)).toBeGreaterThanOrEqual(100 - 1e-9);
        }
      }),
    );
  });

  it('hang right above their intervals where there is room', () => {
    const lefts = hangTiles({ centresPx: [100, 300, 700], slotPx: 100, fromPx: 0, toPx: 900 });
    expect(lefts).toEqual([50, 250, 650]);
  });

  it('stay side by side where they are more than the room holds', () => {
    const lefts = hangTiles({ centresPx: [10, 20, 30, 40], slotPx: 100, fromPx: 5, toPx: 305 });
    expect(lefts).toEqual([5, 105, 205, 305]);
  });
});
