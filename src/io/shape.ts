/** Checks of shapes and blocks that all binary readers share. */
import { RimlightError } from '../errors';
import type { ElementType } from './container';
import { bytesOfType, mostBytesPerRead } from './dtype';
import { scanError, tooBigHint } from './scan-error';

/** More axes than any library allows. */
const mostAxes = 64;

/**
 * How many values a shape has.
 *
 * @throws RimlightError 'scan' - when a length is no whole number or the product is past 2^53
 */
export function valuesOf(shape: readonly number[], where: string): number {
  let product = 1;
  let isEmpty = false;
  for (const length of shape) {
    if (!Number.isSafeInteger(length) || length < 0) {
      throw scanError(`an axis is ${length} long`, where);
    }
    if (length === 0) isEmpty = true;
    else product *= length;
  }
  if (!Number.isSafeInteger(product) || shape.length > mostAxes) {
    throw scanError(`its size is absurd: ${shapeText(shape)} values`, where);
  }
  return isEmpty ? 0 : product;
}

export function shapeText(shape: readonly number[]): string {
  const shown = shape.length > 8 ? [...shape.slice(0, 8), '…'] : shape;
  return shown.length === 0 ? 'a single value' : shown.join(' × ');
}

/**
 * How many values a block has, after checking that it lies inside the array.
 *
 * @throws RimlightError 'fault' - when it does not; 'scan' - when it is more than can be read at once
 */
export function checkBlock(
  array: { readonly shape: readonly number[]; readonly type: ElementType },
  start: readonly number[],
  count: readonly number[],
  where: string,
): number {
  const { shape, type } = array;
  const isInside =
    start.length === shape.length &&
    count.length === shape.length &&
    shape.every(
      (length, axis) =>
        Number.isSafeInteger(start[axis]) &&
        Number.isSafeInteger(count[axis]) &&
        start[axis] >= 0 &&
        count[axis] >= 0 &&
        start[axis] + count[axis] <= length,
    );
  if (!isInside) {
    throw new RimlightError('fault', {
      what: `the block at (${start.join(', ')}) of (${count.join(', ')}) is not inside ${shapeText(shape)}`,
      where,
      hint: 'Please report this.',
    });
  }
  const values = count.reduce((product, length) => product * length, 1);
  const bytes = values * bytesOfType[type];
  if (bytes > mostBytesPerRead) {
    throw scanError(
      `${(bytes / 2 ** 30).toFixed(1)} GiB are asked for at once (at most 16)`,
      where,
      tooBigHint,
    );
  }
  return values;
}
