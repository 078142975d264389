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

  it('hold the same light to the last fraction of a channel, whatever the spectrum', () => {
    const spectra = fc.array(fc.double({ min: 1, max: 1e4, noNaN: true }), {
      minLength: 12,
      maxLength: 200,
    });
    const gaps = fc.array(fc.nat(199), { maxLength: 5 });
    fc.assert(
      fc.property(spectra, gaps, fc.integer({ min: 1, max: 6 }), (values, noData, count) => {
        const mean = Float64Array.from(values, (value, k) =>
          noData.includes(k) ? Number.NaN : value,
        );
        const sorted = mean.filter(Number.isFinite).sort();
        fc.pre(sorted.length > 10 && sorted.at(-1)! > 2 * sorted[0]!);
        const centresEv = mean.map((_, k) => 1.8 + 0.001 * k);
        const axis = { centresEv, edgesEv: channelEdges(centresEv) };
        const floor = sorted[Math.floor(sorted.length / 10)]!;
        const lightBetween = (fromEv: number, toEv: number): number =>
          mean.reduce((sum, value, k) => {
            const low = axis.edgesEv[k]!;
            const high = axis.edgesEv[k + 1]!;
            const covered = Math.max(0, Math.min(toEv, high) - Math.max(fromEv, low));
            const light = Number.isFinite(value) ? Math.max(value - floor, 0) : 0;
            return sum + (light * covered) / (high - low);
          }, 0);
        const total = lightBetween(0, 9);
        for (const { fromEv, toEv } of startingBands(axis, mean, count)) {
          expect(lightBetween(fromEv, toEv) / total).toBeCloseTo(0.96 / count, 9);
        }
      }),
    );
  });

  it('divide a dark axis evenly', () => {
    const centresEv = Float64Array.from({ length: 30 }, (_, k) => 1.805 + 0.01 * k);
    const axis = { centresEv, edgesEv: channelEdges(centresEv) };
    const bands = startingBands(axis, new Float64Array(30).fill(7), 3);
    for (const [index, { fromEv, toEv }] of bands.entries()) {
      expect(fromEv).toBeCloseTo(1.8 + 0.1 * index, 9);
      expect(toEv).toBeCloseTo(1.9 + 0.1 * index, 9);
    }
  });
});
