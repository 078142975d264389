/** Points and axis values of long rows, numbered in the order they are met. */
import { GrowingColumn } from './value-range';

/** Numbers points by their position. */
export class PointIndex {
  readonly x = new GrowingColumn();
  readonly y = new GrowingColumn();
  private readonly byX = new Map<number, Map<number, number>>();
  private last = -1;
  private lastX = Number.NaN;
  private lastY = Number.NaN;

  /** The number of the point at a position; −1 for a new one. */
  find(x: number, y: number): number {
    if (x === this.lastX && y === this.lastY) return this.last;
    const point = this.byX.get(x)?.get(y);
    if (point === undefined) return -1;
    this.remember(x, y, point);
    return point;
  }

  /** Numbers a new point. */
  add(x: number, y: number): number {
    const point = this.x.length;
    this.x.push(x);
    this.y.push(y);
    const column = this.byX.get(x);
    if (column === undefined) this.byX.set(x, new Map([[y, point]]));
    else column.set(y, point);
    this.remember(x, y, point);
    return point;
  }

  private remember(x: number, y: number, point: number): void {
    this.last = point;
    this.lastX = x;
    this.lastY = y;
  }
}

/** Numbers axis values. */
export class AxisIndex {
  readonly values = new GrowingColumn();
  private readonly byValue = new Map<number, number>();

  /** @param guess - tried first: the channel after the one before */
  find(value: number, guess: number): number {
    if (guess < this.values.length && this.values.at(guess) === value) return guess;
    return this.byValue.get(value) ?? -1;
  }

  add(value: number): number {
    const channel = this.values.length;
    this.values.push(value);
    this.byValue.set(value, channel);
    return channel;
  }
}
