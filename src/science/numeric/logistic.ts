/** The falling step 1/(1 + eˣ), from a table: for weights, of which there are a thousand a spectrum and round. */
import { exp } from './elementary';

/** Beyond this the step is 1 or 0 to rounding. */
const reach = 37;
/** Places in the table for each unit of x. */
const perUnit = 32;

let table: Float64Array | null = null;

function filled(): Float64Array {
  return Float64Array.from({ length: 2 * reach * perUnit + 2 }, (_, i) => {
    return 1 / (1 + exp(i / perUnit - reach));
  });
}

/**
 * 1/(1 + eˣ) by cubics between the table's places, whose slopes are f (f − 1); off by 4e-10 at most. NaN for NaN.
 */
export function fallingStep(x: number): number {
  if (!(x > -reach)) return Number.isNaN(x) ? x : 1;
  if (x >= reach) return 0;
  table ??= filled();
  const place = (x + reach) * perUnit;
  const i = Math.floor(place);
  const t = place - i;
  const u = 1 - t;
  const from = table[i];
  const to = table[i + 1];
  return (
    from * u * u * (1 + 2 * t) +
    to * t * t * (1 + 2 * u) +
    (t * u * (from * (from - 1) * u - to * (to - 1) * t)) / perUnit
  );
}
