import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { bandChannels, shareOf } from '../../../src/science/bands/band-channels';
import { axisOf, energyAt, gratingAxis } from './made-slab';

/** Edges at 0.5, 1.5, … 5.5 eV. */
const axis = axisOf(Float64Array.of(1, 2, 3, 4, 5));
const channelsOf = (fromEv: number, toEv: number) =>
  bandChannels(axis, { fromEv, toEv, floor: 'none' });

describe('the channels of a band', () => {
  it('are covered in part at its ends and whole between', () => {
    expect(channelsOf(1.25, 4.25)).toEqual({
      first: 0,
      last: 3,
      firstShare: 0.25,
      lastShare: 0.75,
      fromEv: 1.25,
      toEv: 4.25,
    });
  });

  it('are one when the band lies within one', () => {
    expect(channelsOf(2.75, 3)).toMatchObject({ first: 2, last: 2, firstShare: 0.25 });
  });

  it('end at the axis', () => {
    const all = { first: 0, last: 4, firstShare: 1, lastShare: 1, fromEv: 0.5, toEv: 5.5 };
    expect(channelsOf(-10, 10)).toEqual(all);
    expect(channelsOf(0.5, 5.5)).toEqual(all);
  });

  it('are none outside the axis or for an empty band', () => {
    for (const [from, to] of [
      [6, 7],
      [-2, 0.5],
      [5.5, 9],
      [3, 3],
      [4, 2],
      [Number.NaN, 3],
    ]) {
      expect(channelsOf(from, to)).toBeNull();
    }
  });

  it('do not include one of which rounding alone covers a sliver', () => {
    // 3.5 is the edge between channels 2 and 3.
    expect(channelsOf(1.5, 3.5 + 1e-12)).toMatchObject({ first: 1, last: 2, lastShare: 1 });
    expect(channelsOf(1.5 - 1e-12, 3.5)).toMatchObject({ first: 1, firstShare: 1, last: 2 });
    expect(channelsOf(1.5, 3.5 + 1e-6)).toMatchObject({ last: 3 });
    expect(channelsOf(1.5 - 1e-12, 1.7)).toMatchObject({ first: 1, last: 1 });
  });

  it('together are as wide as the band, on any axis', () => {
    fc.assert(
      fc.property(
        fc.integer({ min: 2, max: 200 }),
        fc.double({ min: -0.2, max: 1.2, noNaN: true }),
        fc.double({ min: -0.2, max: 1.2, noNaN: true }),
        (nk, a, b) => {
          const grating = gratingAxis(nk);
          const fromEv = energyAt(grating, Math.min(a, b));
          const toEv = energyAt(grating, Math.max(a, b));
          const channels = bandChannels(grating, { fromEv, toEv, floor: 'none' });
          const { edgesEv } = grating;
          const inside = Math.max(0, Math.min(toEv, edgesEv[nk]) - Math.max(fromEv, edgesEv[0]));
          let width = 0;
          for (let k = 0; k < nk && channels !== null; k++) {
            const share = shareOf(channels, k);
            expect(share).toBeGreaterThanOrEqual(0);
            expect(share).toBeLessThanOrEqual(1 + 1e-12);
            width += share * (edgesEv[k + 1] - edgesEv[k]);
          }
          // Slivers of 1e-9 of a channel are left out.
          expect(Math.abs(width - inside)).toBeLessThanOrEqual(3e-9 * (edgesEv[nk] - edgesEv[0]));
        },
      ),
    );
  });
});
