/** The camera: what fits, what stays under the hand, what stays in the pane. */
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { PositionAxis, ScanMeta } from '../../../src/science/scan';
import {
  type Camera,
  fitted,
  middleOf,
  oneToOne,
  panBy,
  pixelAt,
  place,
  zoomAbout,
} from '../../../src/views/canvas/camera';
import { fieldOf } from '../../../src/views/canvas/field-of';

const square = { nx: 100, ny: 100, aspect: 1 };
const pane = { widthPx: 400, heightPx: 500 };

describe('place', () => {
  it('fits the whole map, across the middle and at the top', () => {
    expect(place(fitted, square, pane)).toEqual({ leftPx: 0, topPx: 0, columnPx: 4, rowPx: 4 });
    const wide = { widthPx: 900, heightPx: 300 };
    expect(place(fitted, square, wide)).toEqual({ leftPx: 300, topPx: 0, columnPx: 3, rowPx: 3 });
  });

  it('draws pixels in proportion to their pitch', () => {
    const { columnPx, rowPx } = place(fitted, { nx: 100, ny: 50, aspect: 2 }, pane);
    expect(rowPx / columnPx).toBe(2);
  });

  it('never leaves a pane empty that the map could fill', () => {
    const camera = fc.record({
      zoom: fc.double({ min: 0.25, max: 25, noNaN: true }),
      centreX: fc.double({ min: 0, max: 1, noNaN: true }),
      centreY: fc.double({ min: 0, max: 1, noNaN: true }),
    });
    fc.assert(
      fc.property(camera, (one) => {
        const { leftPx, topPx, columnPx, rowPx } = place(one, square, pane);
        for (const [start, length, room] of [
          [leftPx, 100 * columnPx, pane.widthPx],
          [topPx, 100 * rowPx, pane.heightPx],
        ] as const) {
          if (length <= room) expect(start).toBeGreaterThanOrEqual(0);
          else {
            expect(start).toBeLessThanOrEqual(0);
            expect(start + length).toBeGreaterThanOrEqual(room - 1e-9);
          }
        }
      }),
    );
  });
});

describe('zoomAbout', () => {
  it('keeps the point under the cursor there while the map fills the pane', () => {
    const point = fc.record({
      xPx: fc.double({ min: 150, max: 250, noNaN: true }),
      yPx: fc.double({ min: 200, max: 300, noNaN: true }),
    });
    const factor = fc.double({ min: 1, max: 3, noNaN: true });
    const start: Camera = { zoom: 3, centreX: 0.5, centreY: 0.5 };
    fc.assert(
      fc.property(point, factor, (at, by) => {
        const mapPointAt = (camera: Camera) => {
          const { leftPx, topPx, columnPx, rowPx } = place(camera, square, pane);
          return [(at.xPx - leftPx) / columnPx, (at.yPx - topPx) / rowPx] as const;
        };
        const [x, y] = mapPointAt(start);
        const [x1, y1] = mapPointAt(zoomAbout(start, by, at, square, pane));
        expect(x1).toBeCloseTo(x, 9);
        expect(y1).toBeCloseTo(y, 9);
      }),
    );
  });

  it('stops at a quarter of the fit and at four columns across', () => {
    const at = { xPx: 0, yPx: 0 };
    expect(zoomAbout(fitted, 1e-6, at, square, pane).zoom).toBe(0.25);
    expect(zoomAbout(fitted, 1e6, at, square, pane).zoom).toBe(25);
  });
});

describe('panBy', () => {
  it('moves the map with the hand and stops at its edge', () => {
    const start: Camera = { zoom: 4, centreX: 0.5, centreY: 0.5 };
    const before = place(start, square, pane);
    const moved = place(panBy(start, { xPx: 30, yPx: -20 }, square, pane), square, pane);
    expect(moved.leftPx - before.leftPx).toBeCloseTo(30, 9);
    expect(moved.topPx - before.topPx).toBeCloseTo(-20, 9);
    const far = panBy(start, { xPx: 1e6, yPx: 0 }, square, pane);
    expect(place(far, square, pane).leftPx).toBe(0);
    // and comes back at once, without taking back what the edge had swallowed
    const back = place(panBy(far, { xPx: -10, yPx: 0 }, square, pane), square, pane);
    expect(back.leftPx).toBeCloseTo(-10, 9);
  });
});

describe('oneToOne', () => {
  it('gives each column one CSS pixel', () => {
    expect(place(oneToOne(fitted, square, pane), square, pane).columnPx).toBe(1);
  });
});

describe('pixelAt', () => {
  it('is undone by the middle of the pixel', () => {
    const placement = place({ zoom: 2.7, centreX: 0.3, centreY: 0.8 }, square, pane);
    for (const pixel of [
      { y: 60, x: 20 },
      { y: 99, x: 40 },
    ]) {
      expect(pixelAt(middleOf(pixel, placement), placement, square)).toEqual(pixel);
    }
  });

  it('is none beside the map', () => {
    const placement = place(fitted, square, pane);
    expect(pixelAt({ xPx: 399.9, yPx: 399.9 }, placement, square)).toEqual({ y: 99, x: 99 });
    expect(pixelAt({ xPx: 10, yPx: 400 }, placement, square)).toBeNull();
    expect(pixelAt({ xPx: -0.1, yPx: 10 }, placement, square)).toBeNull();
  });
});

describe('fieldOf', () => {
  const length = (pitch: number): PositionAxis => ({
    label: 'x',
    unit: 'nm',
    isLength: true,
    pitch,
    values: null,
  });
  const volts: PositionAxis = { ...length(0.1), unit: 'V', isLength: false };
  const fieldFor = (nx: number, ny: number, x: PositionAxis, y: PositionAxis) => {
    const field = fieldOf({ shape: { ny, nx, nk: 9 }, x, y } as ScanMeta);
    return { ...field, height: (field.ny * field.aspect) / field.nx };
  };

  it('keeps the proportion of two lengths, however long the map', () => {
    expect(fieldFor(100, 10, length(10), length(20)).aspect).toBe(2);
    expect(fieldFor(1000, 2, length(10), length(10)).height).toBeCloseTo(0.002, 12);
  });

  it('stretches a lone row, and axes that are no lengths, until they can be seen', () => {
    expect(fieldFor(200, 1, length(10), length(10)).height).toBeCloseTo(0.25, 12);
    expect(fieldFor(1, 200, length(10), length(10)).height).toBeCloseTo(4, 12);
    expect(fieldFor(300, 3, volts, length(10)).height).toBeCloseTo(0.25, 12);
    expect(fieldFor(30, 30, volts, length(10)).height).toBeCloseTo(1, 12);
  });
});
