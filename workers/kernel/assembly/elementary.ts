/** Elementary functions of the fit's loops, two arguments to a vector; twin: `src/science/fit/kernel-elementary.ts`. */

const LOG2E: f64 = Math.LOG2E;
const LN2_HIGH: f64 = 0.6931471803691238;
const LN2_LOW: f64 = 1.9082149292705877e-10;
/** Above this tangent an angle is halved before its series is used. */
export const SERIES_LIMIT: f64 = 0.25;

/** e^x for −700 < x < 700: 2^k times a series of x − k ln 2. */
export function exponential(x: v128): v128 {
  const k = f64x2.nearest(f64x2.mul(x, f64x2.splat(LOG2E)));
  let r = f64x2.sub(x, f64x2.mul(k, f64x2.splat(LN2_HIGH)));
  r = f64x2.sub(r, f64x2.mul(k, f64x2.splat(LN2_LOW)));
  let p = f64x2.splat(2.08767569878681e-9);
  p = f64x2.add(f64x2.mul(p, r), f64x2.splat(2.505210838544172e-8));
  p = f64x2.add(f64x2.mul(p, r), f64x2.splat(2.755731922398589e-7));
  p = f64x2.add(f64x2.mul(p, r), f64x2.splat(2.7557319223985893e-6));
  p = f64x2.add(f64x2.mul(p, r), f64x2.splat(2.48015873015873e-5));
  p = f64x2.add(f64x2.mul(p, r), f64x2.splat(1.984126984126984e-4));
  p = f64x2.add(f64x2.mul(p, r), f64x2.splat(1.388888888888889e-3));
  p = f64x2.add(f64x2.mul(p, r), f64x2.splat(8.333333333333333e-3));
  p = f64x2.add(f64x2.mul(p, r), f64x2.splat(4.1666666666666664e-2));
  p = f64x2.add(f64x2.mul(p, r), f64x2.splat(0.16666666666666666));
  p = f64x2.add(f64x2.mul(p, r), f64x2.splat(0.5));
  p = f64x2.add(f64x2.mul(p, r), f64x2.splat(1));
  p = f64x2.add(f64x2.mul(p, r), f64x2.splat(1));
  const power = i64x2.add(
    i64x2.extend_low_i32x4_s(i32x4.trunc_sat_f64x2_s_zero(k)),
    i64x2.splat(1023),
  );
  return f64x2.mul(p, i64x2.shl(power, 52));
}

/** ln x for normal x > 0: k ln 2 and the series of the area tangent of (m − 1)/(m + 1), √½ ≤ m < √2. */
export function logarithm(x: v128): v128 {
  const k = i64x2.shr_s(i64x2.sub(x, i64x2.splat(0x3fe6a09e00000000)), 52);
  const m = i64x2.sub(x, i64x2.shl(k, 52));
  const power = f64x2.convert_low_i32x4_s(v128.shuffle<i32>(k, k, 0, 2, 0, 2));
  const one = f64x2.splat(1);
  const s = f64x2.div(f64x2.sub(m, one), f64x2.add(m, one));
  const z = f64x2.mul(s, s);
  let p = f64x2.splat(0.05263157894736842);
  p = f64x2.add(f64x2.mul(p, z), f64x2.splat(0.058823529411764705));
  p = f64x2.add(f64x2.mul(p, z), f64x2.splat(0.06666666666666667));
  p = f64x2.add(f64x2.mul(p, z), f64x2.splat(0.07692307692307693));
  p = f64x2.add(f64x2.mul(p, z), f64x2.splat(0.09090909090909091));
  p = f64x2.add(f64x2.mul(p, z), f64x2.splat(0.1111111111111111));
  p = f64x2.add(f64x2.mul(p, z), f64x2.splat(0.14285714285714285));
  p = f64x2.add(f64x2.mul(p, z), f64x2.splat(0.2));
  p = f64x2.add(f64x2.mul(p, z), f64x2.splat(0.3333333333333333));
  const twice = f64x2.add(s, s);
  const low = f64x2.add(f64x2.mul(f64x2.mul(twice, z), p), f64x2.mul(power, f64x2.splat(LN2_LOW)));
  return f64x2.add(f64x2.mul(power, f64x2.splat(LN2_HIGH)), f64x2.add(twice, low));
}

/** atan t − t over t³, t² = z ≤ 1/16. */
export function arcTangentRest(z: v128): v128 {
  let p = f64x2.splat(0.05263157894736842);
  p = f64x2.sub(f64x2.splat(0.058823529411764705), f64x2.mul(p, z));
  p = f64x2.sub(f64x2.splat(0.06666666666666667), f64x2.mul(p, z));
  p = f64x2.sub(f64x2.splat(0.07692307692307693), f64x2.mul(p, z));
  p = f64x2.sub(f64x2.splat(0.09090909090909091), f64x2.mul(p, z));
  p = f64x2.sub(f64x2.splat(0.1111111111111111), f64x2.mul(p, z));
  p = f64x2.sub(f64x2.splat(0.14285714285714285), f64x2.mul(p, z));
  p = f64x2.sub(f64x2.splat(0.2), f64x2.mul(p, z));
  return f64x2.sub(f64x2.mul(p, z), f64x2.splat(0.3333333333333333));
}

/** The angle of (x, y), y > 0, halved until its tangent is small. */
export function angle(y: f64, x: f64): f64 {
  let t = y / x;
  let times: f64 = 1;
  if (!(x > 0 && t <= SERIES_LIMIT)) {
    const r = sqrt<f64>(x * x + y * y);
    t = x > 0 ? y / (x + r) : (r - x) / y;
    times = 2;
    while (t > SERIES_LIMIT) {
      t = t / (1 + sqrt<f64>(1 + t * t));
      times *= 2;
    }
  }
  const z = f64x2.splat(t * t);
  const rest = f64x2.extract_lane(arcTangentRest(z), 0);
  return times * (t + t * (t * t) * rest);
}
