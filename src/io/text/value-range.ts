/** What values a column or cube holds, kept while they are read: the smallest type that holds them exactly. */
import type { CountsArray } from '../../science/scan';
import type { ElementType } from '../container';
import { arrayOfType } from '../dtype';

const integerTypes: readonly (readonly [ElementType, number, number])[] = [
  ['uint8', 0, 0xff],
  ['int8', -0x80, 0x7f],
  ['uint16', 0, 0xffff],
  ['int16', -0x8000, 0x7fff],
  ['uint32', 0, 0xffffffff],
  ['int32', -0x80000000, 0x7fffffff],
];

export class ValueRange {
  min = Number.POSITIVE_INFINITY;
  max = Number.NEGATIVE_INFINITY;
  /** values that are numbers */
  finite = 0;
  missing = 0;
  private isWhole = true;

  /** @param value - NaN for no data */
  add(value: number): void {
    if (Number.isNaN(value)) {
      this.missing++;
      return;
    }
    this.finite++;
    if (value < this.min) this.min = value;
    if (value > this.max) this.max = value;
    if (this.isWhole && !Number.isInteger(value)) this.isWhole = false;
  }

  /** Whole numbers without a gap in the smallest integer type that holds them, otherwise doubles. */
  get type(): ElementType {
    if (!this.isWhole || this.missing > 0 || this.finite === 0) return 'float64';
    const fit = integerTypes.find(([, low, high]) => this.min >= low && this.max <= high);
    return fit === undefined ? 'float64' : fit[0];
  }
}

/** Numbers that become more as rows are read. */
export class GrowingValues {
  length = 0;
  private held = new Float64Array(256);

  push(value: number): void {
    if (this.length === this.held.length) {
      const longer = new Float64Array(2 * this.length);
      longer.set(this.held);
      this.held = longer;
    }
    this.held[this.length++] = value;
  }

  at(index: number): number {
    return this.held[index];
  }

  /** (length), a view of what is held */
  get values(): Float64Array {
    return this.held.subarray(0, this.length);
  }
}

/** A column with the range of its values. */
export class GrowingColumn extends GrowingValues {
  readonly range = new ValueRange();

  override push(value: number): void {
    super.push(value);
    this.range.add(value);
  }

  /** The values in their smallest type. */
  narrowed(): CountsArray {
    return inType(this.values, this.range.type);
  }
}

export function columnOf(values: Iterable<number>): GrowingColumn {
  const column = new GrowingColumn();
  for (const value of values) column.push(value);
  return column;
}

export function inType(values: Float64Array, type: ElementType): CountsArray {
  const narrow = new arrayOfType[type](values.length);
  narrow.set(values);
  return narrow;
}
