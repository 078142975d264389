/**
 * The error function and its kin, by the rational approximations of Cody, Math. Comp. 23, 631 (1969),
 * over our own exponential: the same bits everywhere. Greatest errors, each relative to the value and
 * measured against mpmath on 3000 arguments: erf 4e-16, erfc and erfcx 1e-15, while no subnormal number.
 */
import { exp } from './elementary';

const a = [
  3.1611237438705655, 113.86415415105016, 377.485237685302, 3209.3775891384694, 0.18577770618460315,
] as const;
const b = [23.601290952344122, 244.02463793444417, 1282.6165260773723, 2844.236833439171] as const;
const c = [
  0.5641884969886701, 8.883149794388377, 66.11919063714163, 298.6351381974001, 881.952221241769,
  1712.0476126340707, 2051.0783778260716, 1230.3393547979972, 2.1531153547440383e-8,
] as const;
const d = [
  15.744926110709835, 117.6939508913125, 537.1811018620099, 1621.3895745666903, 3290.7992357334597,
  4362.619090143247, 3439.3676741437216, 1230.3393548037495,
] as const;
const p = [
  0.30532663496123236, 0.36034489994980445, 0.12578172611122926, 0.016083785148742275,
  0.0006587491615298378, 0.016315387137302097,
] as const;
const q = [
  2.568520192289822, 1.8729528499234604, 0.5279051029514285, 0.06051834131244132,
  0.0023352049762686918,
] as const;

const oneOverSqrtPi = 0.5641895835477563;
/** Below it the series of erf itself is used. */
const small = 0.46875;

/** erf x = 2/√π ∫₀ˣ exp(−t²) dt. */
export function erf(x: number): number {
  const size = Math.abs(x);
  if (size <= small) return smallErf(x);
  const rest = 1 - exp(-x * x) * scaledTail(size);
  return x < 0 ? -rest : rest;
}

/** erfc x = 1 − erf x, without cancellation for large x. */
export function erfc(x: number): number {
  const size = Math.abs(x);
  if (size <= small) return 1 - smallErf(x);
  const tail = expMinusSquare(size) * scaledTail(size);
  return x < 0 ? 2 - tail : tail;
}

/** erfcx x = exp(x²) erfc x; grows like 2 exp(x²) for negative x, to infinity below −26.6. */
export function erfcx(x: number): number {
  if (Math.abs(x) <= small) return exp(x * x) * (1 - smallErf(x));
  if (x >= 0) return scaledTail(x);
  return 2 * expSquare(-x) - scaledTail(-x);
}

function smallErf(x: number): number {
  const square = x * x;
  let above = a[4] * square;
  let below = square;
  for (let i = 0; i < 3; i++) {
    above = (above + a[i]) * square;
    below = (below + b[i]) * square;
  }
  return (x * (above + a[3])) / (below + b[3]);
}

/** exp(x²) erfc x for x > 0.46875. */
function scaledTail(x: number): number {
  if (x <= 4) {
    let above = c[8] * x;
    let below = x;
    for (let i = 0; i < 7; i++) {
      above = (above + c[i]) * x;
      below = (below + d[i]) * x;
    }
    return (above + c[7]) / (below + d[7]);
  }
  const inverse = 1 / (x * x);
  let above = p[5] * inverse;
  let below = inverse;
  for (let i = 0; i < 4; i++) {
    above = (above + p[i]) * inverse;
    below = (below + q[i]) * inverse;
  }
  const series = (inverse * (above + p[4])) / (below + q[4]);
  return (oneOverSqrtPi - series) / x;
}

/** exp(−x²) with the square's rounding taken out, as Cody does: x² in two parts. */
function expMinusSquare(x: number): number {
  const head = Math.trunc(x * 16) / 16;
  return exp(-head * head) * exp(-(x - head) * (x + head));
}

/** exp(x²), the same way. */
function expSquare(x: number): number {
  const head = Math.trunc(x * 16) / 16;
  return exp(head * head) * exp((x - head) * (x + head));
}
