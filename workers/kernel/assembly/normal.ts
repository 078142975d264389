/** Normal equations of a fit in AssemblyScript; twin: `src/science/fit/fit-kernel.ts`. Addresses are in bytes. */

/** Σ a b over channels from ≤ k < end, in four chains. */
function dot(a: usize, b: usize, from: i32, end: i32): f64 {
  let k = from;
  let low = f64x2.splat(0);
  let high = f64x2.splat(0);
  for (const last = end - 3; k < last; k += 4) {
    const at = (<usize>k) << 3;
    low = f64x2.add(low, f64x2.mul(v128.load(a + at), v128.load(b + at)));
    high = f64x2.add(high, f64x2.mul(v128.load(a + at, 16), v128.load(b + at, 16)));
  }
  return finish(low, high, a, b, k, end);
}

/** The last channels go to the first chain. */
function finish(low: v128, high: v128, a: usize, b: usize, from: i32, end: i32): f64 {
  let first = f64x2.extract_lane(low, 0);
  for (let k = from; k < end; k++) {
    const at = (<usize>k) << 3;
    first += load<f64>(a + at) * load<f64>(b + at);
  }
  return (
    first + f64x2.extract_lane(high, 0) + (f64x2.extract_lane(low, 1) + f64x2.extract_lane(high, 1))
  );
}

/** `dot` with three columns over the same channels, whose loads of `a` they share. */
function dotThree(a: usize, b: usize, c: usize, d: usize, from: i32, end: i32, out: usize): void {
  let k = from;
  let bLow = f64x2.splat(0);
  let bHigh = f64x2.splat(0);
  let cLow = f64x2.splat(0);
  let cHigh = f64x2.splat(0);
  let dLow = f64x2.splat(0);
  let dHigh = f64x2.splat(0);
  for (const last = end - 3; k < last; k += 4) {
    const at = (<usize>k) << 3;
    const low = v128.load(a + at);
    const high = v128.load(a + at, 16);
    bLow = f64x2.add(bLow, f64x2.mul(low, v128.load(b + at)));
    bHigh = f64x2.add(bHigh, f64x2.mul(high, v128.load(b + at, 16)));
    cLow = f64x2.add(cLow, f64x2.mul(low, v128.load(c + at)));
    cHigh = f64x2.add(cHigh, f64x2.mul(high, v128.load(c + at, 16)));
    dLow = f64x2.add(dLow, f64x2.mul(low, v128.load(d + at)));
    dHigh = f64x2.add(dHigh, f64x2.mul(high, v128.load(d + at, 16)));
  }
  store<f64>(out, finish(bLow, bHigh, a, b, k, end));
  store<f64>(out, finish(cLow, cHigh, a, c, k, end), 8);
  store<f64>(out, finish(dLow, dHigh, a, d, k, end), 16);
}

/**
 * Normal equations of `size` columns.
 *
 * @param table - for each column its address, first and end channel, 32 bits each
 */
export function normal(
  size: i32,
  table: usize,
  weights: usize,
  residuals: usize,
  product: usize,
  matrix: usize,
  gradient: usize,
): void {
  for (let i = 0; i < size; i++) {
    const entry = table + <usize>(12 * i);
    const column = <usize>load<i32>(entry);
    const first = load<i32>(entry, 4);
    const end = load<i32>(entry, 8);
    for (let k = first; k < end; k += 2) {
      const at = (<usize>k) << 3;
      v128.store(product + at, f64x2.mul(v128.load(column + at), v128.load(weights + at)));
    }
    store<f64>(gradient + <usize>(8 * i), dot(residuals, column, first, end));
    const row = matrix + <usize>(8 * i * size);
    let j = 0;
    while (j <= i) {
      const other = table + <usize>(12 * j);
      const from = max(first, load<i32>(other, 4));
      const to = min(end, load<i32>(other, 8));
      if (j + 2 <= i && isAlike(other, other + 12) && isAlike(other, other + 24)) {
        dotThree(
          product,
          <usize>load<i32>(other),
          <usize>load<i32>(other, 12),
          <usize>load<i32>(other, 24),
          from,
          to,
          row + <usize>(8 * j),
        );
        j += 3;
      } else {
        store<f64>(row + <usize>(8 * j), dot(product, <usize>load<i32>(other), from, to));
        j++;
      }
    }
  }
}

function isAlike(one: usize, other: usize): bool {
  return load<i64>(one, 4) === load<i64>(other, 4);
}
