/**
 * Shapes of a fit in AssemblyScript, two channels to a vector of doubles; twin:
 * `src/science/fit/kernel-shapes.ts`. Addresses are in bytes; arrays may be read and written one value beyond
 * their end, but for Gaussians, which touch their span only.
 */
import { angle, arcTangentRest, exponential, SERIES_LIMIT } from './elementary';

const SQRT_TWO_PI: f64 = 2.5066282746310002;

/** model += a + b x + c x² */
export function addPolynomial(channels: i32, x: usize, model: usize, a: f64, b: f64, c: f64): void {
  const last = model + ((<usize>channels) << 3);
  while (model < last) {
    const e = v128.load(x);
    const inner = f64x2.add(f64x2.splat(b), f64x2.mul(f64x2.splat(c), e));
    const value = f64x2.add(f64x2.splat(a), f64x2.mul(inner, e));
    v128.store(model, f64x2.add(v128.load(model), value));
    x += 16;
    model += 16;
  }
}

/** model += level exp(−x/length), with its derivatives where `byLevel` is an address. */
export function addDecay(
  channels: i32,
  x: usize,
  model: usize,
  level: f64,
  length: f64,
  byLevel: usize,
  byLength: usize,
): void {
  const last = model + ((<usize>channels) << 3);
  const rate = f64x2.splat(-1 / length);
  const steepness = f64x2.splat(level / (length * length));
  while (model < last) {
    const e = v128.load(x);
    const steps = f64x2.min(f64x2.max(f64x2.mul(e, rate), f64x2.splat(-700)), f64x2.splat(700));
    const falling = exponential(steps);
    v128.store(model, f64x2.add(v128.load(model), f64x2.mul(f64x2.splat(level), falling)));
    if (byLevel !== 0) {
      v128.store(byLevel, falling);
      v128.store(byLength, f64x2.mul(f64x2.mul(steepness, falling), e));
      byLevel += 16;
      byLength += 16;
    }
    x += 16;
    model += 16;
  }
}

/**
 * A Gaussian whose channels are narrow: density times width, with the next term of the integral.
 *
 * @param total - area
 * @param columns - by area, centre and fwhm, `stride` bytes apart; 0 for none
 */
export function addGaussian(
  first: i32,
  end: i32,
  centres: usize,
  widths: usize,
  model: usize,
  columns: usize,
  stride: usize,
  total: f64,
  middle: f64,
  sigma: f64,
  fwhmPerSigma: f64,
): void {
  const perSigma = f64x2.splat(1 / sigma);
  const centre = f64x2.splat(middle);
  const height = f64x2.splat(1 / SQRT_TWO_PI);
  const area = f64x2.splat(total);
  const byCentre = f64x2.splat(total / sigma);
  const byWidth = f64x2.splat(total / sigma / fwhmPerSigma);
  const perTwentyFour = f64x2.splat(1.0 / 24.0);
  for (let k = first; k < end; k += 2) {
    const at = (<usize>k) << 3;
    const w = f64x2.mul(v128.load(widths + at), perSigma);
    const z = f64x2.mul(f64x2.sub(v128.load(centres + at), centre), perSigma);
    const square = f64x2.mul(z, z);
    const bell = exponential(f64x2.mul(square, f64x2.splat(-0.5)));
    const density = f64x2.mul(f64x2.mul(bell, height), w);
    const correction = f64x2.mul(f64x2.mul(w, w), perTwentyFour);
    const share = f64x2.mul(
      density,
      f64x2.add(f64x2.splat(1), f64x2.mul(correction, f64x2.sub(square, f64x2.splat(1)))),
    );
    storeWithin(model + at, f64x2.add(v128.load(model + at), f64x2.mul(area, share)), k, end);
    if (columns === 0) continue;
    const to = columns + at;
    storeWithin(to, share, k, end);
    const slope = f64x2.mul(
      f64x2.mul(density, z),
      f64x2.add(f64x2.splat(1), f64x2.mul(correction, f64x2.sub(square, f64x2.splat(3)))),
    );
    storeWithin(to + stride, f64x2.mul(byCentre, slope), k, end);
    const fourth = f64x2.add(f64x2.mul(square, f64x2.sub(square, f64x2.splat(6))), f64x2.splat(3));
    const spread = f64x2.mul(
      density,
      f64x2.add(f64x2.sub(square, f64x2.splat(1)), f64x2.mul(correction, fourth)),
    );
    storeWithin(to + 2 * stride, f64x2.mul(byWidth, spread), k, end);
  }
}

/** Both values, or the first alone where the second lies beyond the end. */
function storeWithin(at: usize, pair: v128, k: i32, end: i32): void {
  if (k + 1 < end) v128.store(at, pair);
  else store<f64>(at, f64x2.extract_lane(pair, 0));
}

/**
 * A Lorentzian integrated over each channel.
 *
 * @param weight - of the Lorentzian in the peak: 1, or a pseudo-Voigt's share, whose derivative goes to a fourth column
 * @param columns - by area, centre and fwhm, `stride` bytes apart; 0 for none
 */
export function addLorentzian(
  channels: i32,
  edges: usize,
  widths: usize,
  model: usize,
  columns: usize,
  stride: usize,
  total: f64,
  middle: f64,
  half: f64,
  weight: f64,
  hasShare: bool,
): void {
  const centre = f64x2.splat(middle);
  const gamma = f64x2.splat(half);
  const square = f64x2.splat(half * half);
  const perPi = f64x2.splat(1 / Math.PI);
  const amplitude = f64x2.splat(total * weight);
  const part = f64x2.splat(weight);
  const whole = f64x2.splat(total);
  const steepness = f64x2.splat((total * weight) / Math.PI);
  for (let k = 0; k < channels; k += 2) {
    const at = (<usize>k) << 3;
    const low = f64x2.sub(v128.load(edges + at), centre);
    const high = f64x2.sub(v128.load(edges + at, 8), centre);
    const width = v128.load(widths + at);
    const product = f64x2.mul(low, high);
    const y = f64x2.mul(gamma, width);
    const x = f64x2.add(square, product);
    const t = f64x2.div(y, x);
    const isSmall = v128.and(f64x2.gt(x, f64x2.splat(0)), f64x2.le(t, f64x2.splat(SERIES_LIMIT)));
    let theta: v128;
    if (i64x2.all_true(isSmall)) {
      const z = f64x2.mul(t, t);
      theta = f64x2.add(t, f64x2.mul(f64x2.mul(t, z), arcTangentRest(z)));
    } else {
      theta = f64x2.splat(angle(f64x2.extract_lane(y, 0), f64x2.extract_lane(x, 0)));
      const other = angle(f64x2.extract_lane(y, 1), f64x2.extract_lane(x, 1));
      theta = f64x2.replace_lane(theta, 1, other);
    }
    const share = f64x2.mul(theta, perPi);
    v128.store(model + at, f64x2.add(v128.load(model + at), f64x2.mul(amplitude, share)));
    if (columns === 0) continue;
    const to = columns + at;
    v128.store(to, f64x2.mul(part, share));
    const atLow = f64x2.add(f64x2.mul(low, low), square);
    const atHigh = f64x2.add(f64x2.mul(high, high), square);
    const scale = f64x2.div(f64x2.mul(steepness, width), f64x2.mul(atLow, atHigh));
    const slope = f64x2.mul(f64x2.mul(scale, gamma), f64x2.add(high, low));
    v128.store(to + stride, slope);
    const spread = f64x2.mul(f64x2.mul(scale, f64x2.splat(0.5)), f64x2.sub(product, square));
    v128.store(to + 2 * stride, spread);
    if (hasShare) v128.store(to + 3 * stride, f64x2.mul(whole, share));
  }
}
