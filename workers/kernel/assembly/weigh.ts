/**
 * Weights and likelihood of a fit in AssemblyScript, two channels to a vector of doubles; twin:
 * `src/science/fit/fit-kernel.ts`. Addresses are in bytes; arrays may be read and written one value beyond
 * their end.
 */
import { logarithm } from './elementary';

/** Weights, residuals and the sums [Σ (μ − n ln μ), Σ (n − μ)²/variance] of counts, as of a Poisson process. */
export function weighCounts(
  channels: i32,
  data: usize,
  model: usize,
  weights: usize,
  residuals: usize,
  scale: f64,
  shift: f64,
  least: f64,
  sums: usize,
): void {
  const last = data + ((<usize>channels) << 3);
  const one = f64x2.splat(1);
  const floor = f64x2.splat(least);
  const by = f64x2.splat(scale);
  const up = f64x2.splat(shift);
  const square = f64x2.splat(scale * scale);
  const perTwice = f64x2.splat(1 / (2 * least));
  let deviance = f64x2.splat(0);
  let pearson = f64x2.splat(0);
  while (data < last) {
    const n = v128.load(data);
    const isThere = f64x2.eq(n, n);
    const mu = f64x2.add(f64x2.mul(v128.load(model), by), up);
    const isAbove = f64x2.gt(mu, floor);
    const clamped = v128.bitselect(mu, floor, isAbove);
    const inverse = f64x2.div(one, clamped);
    const difference = f64x2.sub(n, mu);
    const pull = f64x2.mul(difference, inverse);
    v128.store(weights, v128.and(f64x2.mul(square, inverse), isThere));
    v128.store(residuals, v128.and(f64x2.mul(by, pull), isThere));
    pearson = f64x2.add(pearson, v128.and(f64x2.mul(difference, pull), isThere));
    const atFloor = f64x2.sub(n, floor);
    const bend = f64x2.mul(
      f64x2.sub(f64x2.mul(difference, difference), f64x2.mul(atFloor, atFloor)),
      perTwice,
    );
    const straight = f64x2.sub(clamped, f64x2.mul(n, logarithm(clamped)));
    const part = f64x2.add(straight, v128.andnot(bend, isAbove));
    deviance = f64x2.add(deviance, v128.and(part, isThere));
    data += 16;
    model += 16;
    weights += 16;
    residuals += 16;
  }
  store<f64>(sums, f64x2.extract_lane(deviance, 0) + f64x2.extract_lane(deviance, 1));
  store<f64>(sums, f64x2.extract_lane(pearson, 0) + f64x2.extract_lane(pearson, 1), 8);
}

/** The same where every channel weighs alike; one sum. */
export function weighAlike(
  channels: i32,
  data: usize,
  model: usize,
  weights: usize,
  residuals: usize,
  sums: usize,
): void {
  const last = data + ((<usize>channels) << 3);
  const one = f64x2.splat(1);
  let sum = f64x2.splat(0);
  while (data < last) {
    const difference = f64x2.sub(v128.load(data), v128.load(model));
    const isThere = f64x2.eq(difference, difference);
    const kept = v128.and(difference, isThere);
    v128.store(weights, v128.and(one, isThere));
    v128.store(residuals, kept);
    sum = f64x2.add(sum, f64x2.mul(kept, kept));
    data += 16;
    model += 16;
    weights += 16;
    residuals += 16;
  }
  store<f64>(sums, f64x2.extract_lane(sum, 0) + f64x2.extract_lane(sum, 1));
}
