import { expect, it } from 'vitest';
import { pinnedShapeBits, shapeBitsDigest } from './shape-bits';

it('gives shapes the same bits in every engine', () => {
  expect(shapeBitsDigest()).toBe(pinnedShapeBits);
});
