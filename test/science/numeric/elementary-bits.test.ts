import { expect, it } from 'vitest';
import { elementaryBitsDigest, pinnedElementaryBits } from './elementary-bits';

it('gives the same bits in every engine', () => {
  expect(elementaryBitsDigest()).toBe(pinnedElementaryBits);
});
