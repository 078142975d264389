import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { clearCanvas, drawLine } from '../../../src/views/energy/line-canvas';

interface Call {
  readonly to: 'move' | 'line';
  readonly x: number;
  readonly y: number;
}

/** A canvas that remembers what was drawn on it. */
function fakeCanvas() {
  const calls: Call[] = [];
  const cleared: number[][] = [];
  const context = {
    strokeStyle: '',
    lineWidth: 0,
    lineJoin: '',
    strokes: 0,
    beginPath: () => undefined,
    setLineDash: () => undefined,
    moveTo: (x: number, y: number) => calls.push({ to: 'move', x, y }),
    lineTo: (x: number, y: number) => calls.push({ to: 'line', x, y }),
    clearRect: (...box: number[]) => cleared.push(box),
    stroke: () => {
      context.strokes++;
    },
  };
  const canvas: Partial<HTMLCanvasElement> = {
    width: 300,
    height: 90,
    getContext: (() => context) as never,
  };
  return { canvas: canvas as HTMLCanvasElement, context, calls, cleared };
}

const style = { colour: '#abcdef', widthPx: 1.5 };
const upwards = (counts: number): number => 90 - counts;

describe('a spectrum drawn as a line', () => {
  it('goes through every channel where each has its own place', () => {
    const { canvas, context, calls } = fakeCanvas();
    drawLine(canvas, Float64Array.of(0, 10, 20), upwards, Float64Array.of(1, 40, 3), style);
    expect(calls).toEqual([
      { to: 'move', x: 0, y: 89 },
      { to: 'line', x: 10, y: 50 },
      { to: 'line', x: 20, y: 87 },
    ]);
    expect(context).toMatchObject({ strokeStyle: '#abcdef', lineWidth: 1.5, strokes: 1 });
  });

  it('breaks where there is no data, and is not drawn down to zero', () => {
    const { canvas, calls } = fakeCanvas();
    const counts = Float64Array.of(5, 6, Number.NaN, 7, 8);
    drawLine(canvas, Float64Array.of(0, 10, 20, 30, 40), upwards, counts, style);
    expect(calls.map(({ to, x }) => `${to} ${x}`)).toEqual([
      'move 0',
      'line 10',
      'move 30',
      'line 40',
    ]);
  });

  it('keeps the least and the greatest of channels that share a column', () => {
    const spectrum = fc.array(fc.integer({ min: 0, max: 90 }), { minLength: 1, maxLength: 400 });
    fc.assert(
      fc.property(spectrum, fc.integer({ min: 1, max: 60 }), (values, widthPx) => {
        const { canvas, calls } = fakeCanvas();
        const xsPx = Float64Array.from(values, (_, k) => (k / values.length) * widthPx);
        drawLine(canvas, xsPx, upwards, Float64Array.from(values), style);
        const columnOf = (x: number): number => Math.round(x * 2);
        const columns = new Set(Array.from(xsPx, columnOf));
        for (const column of columns) {
          const drawn = calls.filter(({ x }) => columnOf(x) === column).map(({ y }) => y);
          const held = values.filter((_, k) => columnOf(xsPx[k]!) === column).map(upwards);
          expect(Math.min(...drawn)).toBe(Math.min(...held));
          expect(Math.max(...drawn)).toBe(Math.max(...held));
        }
        expect(calls.filter(({ to }) => to === 'move')).toHaveLength(1);
      }),
    );
  });

  it('costs no more strokes than the columns can show', () => {
    const { canvas, calls } = fakeCanvas();
    const nk = 100_000;
    const xsPx = Float64Array.from({ length: nk }, (_, k) => (k / nk) * 300);
    const counts = Float64Array.from({ length: nk }, (_, k) => k % 2);
    drawLine(canvas, xsPx, upwards, counts, style);
    // Half a CSS pixel a column, a high and a low in each.
    expect(calls.length).toBeLessThanOrEqual(2 * (2 * 300 + 1));
    expect(calls.length).toBeGreaterThan(600);
  });

  it('is wiped with the whole canvas', () => {
    const { canvas, cleared } = fakeCanvas();
    clearCanvas(canvas);
    expect(cleared).toEqual([[0, 0, 300, 90]]);
  });
});
