/** Small values that arbitrary recipes are put together from. */
import fc from 'fast-check';

export const finite = fc.double({ min: -1e6, max: 1e6, noNaN: true });
export const positive = fc.double({ min: 1e-3, max: 1e4, noNaN: true });
export const file = fc.constantFrom('axis.npy', 'dark/mean.csv', 'µ "quoted" \\ name.txt');
export const colour = fc
  .integer({ min: 0, max: 0xffffff })
  .map((n) => `#${n.toString(16).padStart(6, '0')}`);
export const index = fc.nat({ max: 4000 });

/** Optional fields present by chance; the ones in `required` always. */
export function block(
  fields: Record<string, fc.Arbitrary<unknown>>,
  required: readonly string[] = [],
): fc.Arbitrary<Record<string, unknown>> {
  return fc
    .record(fields, { requiredKeys: [...required], noNullPrototype: true })
    .map((value) => value as Record<string, unknown>);
}

/** Two different numbers, in either order. */
export function interval(number: fc.Arbitrary<number>): fc.Arbitrary<[number, number]> {
  return fc.tuple(number, number).filter(([from, to]) => from !== to);
}

export const word = <T extends string>(value: T): fc.Arbitrary<T> => fc.constant(value);
export const bin = fc.integer({ min: 1, max: 8 });
