import { expect, it } from 'vitest';
import { createRandomFromState } from '../../../src/science/numeric/random';

it('gives the published sequence of xoshiro128** from the state 1, 2, 3, 4', () => {
  const random = createRandomFromState([1, 2, 3, 4]);
  // output of xoshiro128starstar.c 1.1 (prng.di.unimi.it), as also kept by the tests of rust-random's rand_xoshiro
  const published = [
    11520, 0, 5927040, 70819200, 2031721883, 1637235492, 1287239034, 3734860849, 3729100597,
    4258142804,
  ];
  expect(published.map(() => random.uint32())).toEqual(published);
});
