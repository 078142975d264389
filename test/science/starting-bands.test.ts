import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { channelEdges } from '../../src/science/axis';
import { startingBands } from '../../src/science/starting-bands';

describe('the bands a fresh scan begins with', () => {
  it('lie on the axis, side by side in order of energy', () => {
    const spectra = fc.array(fc.double({ min: 0, max: 1e4, noNaN: true }), {
      minLength: 12,
      maxLength: 200,
    });
    fc.assert(
      fc.property(spectra, (counts) => {
        const centresEv = Float64Array.from(counts, (_, k) => 1.8 + 0.001 * k);
        const axis = { centresEv, edgesEv: channelEdges(centresEv) };
        const bands = startingBands(axis, Float64Array.from(counts), 3);
        expect(bands).toHaveLength(3);
        for (const [index, { fromEv, toEv }] of bands.entries()) {
          expect(toEv).toBeGreaterThan(fromEv);
          expect(fromEv).toBeGreaterThanOrEqual(axis.edgesEv[0] as number);
          expect(toEv).toBeLessThanOrEqual(axis.edgesEv[counts.length] as number);
          if (index > 0)
            expect(fromEv).toBeGreaterThanOrEqual((bands[index - 1]?.toEv ?? 9) - 1e-12);
        }
      }),
    );
  });

  it('share the light of a peak about equally', () => {
    const centresEv = Float64Array.from({ length: 600 }, (_, k) => 1.8 + 0.0005 * k);
    const counts = centresEv.map((ev) => 1000 * Math.exp(-(((ev - 1.95) / 0.03) ** 2)));
    const axis = { centresEv, edgesEv: channelEdges(centresEv) };
    const light = startingBands(axis, counts, 3).map(({ fromEv, toEv }) =>
      counts.reduce((sum, value, k) => {
        const ev = centresEv[k] ?? 0;
        return ev >= fromEv && ev < toEv ? sum + value : sum;
      }, 0),
    );
    for (const share of light) expect(share / Math.max(...light)).toBeGreaterThan(0.8);
  });
});
