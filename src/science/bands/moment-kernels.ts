/**
 * The inner loops: sums of values and of values times powers of energy over a run of channels, for all
 * pixels of a tile. Three pixels at a time, because an addition takes four cycles and only their
 * interleaving hides that (a fourth no longer fits the registers: measured 30 % slower); a pixel's sum
 * always runs in channel order, so its bits do not depend on which pixels are its neighbours.
 */

/** A run of channels of one tile as doubles: (channels, pixels), C order. */
export interface TileRun {
  readonly values: Float64Array;
  readonly pixels: number;
  /** first channel of the run, and the one after its last */
  readonly k0: number;
  readonly k1: number;
}

/** Σ v, Σ v e and Σ v e² of every pixel; (pixels) each, overwritten. */
export function lowMoments(
  { values, pixels, k0, k1 }: TileRun,
  energies: Float64Array,
  out0: Float64Array,
  out1: Float64Array,
  out2: Float64Array,
): void {
  const inThrees = pixels - (pixels % 3);
  for (let p = 0; p < inThrees; p += 3) {
    let a0 = 0;
    let a1 = 0;
    let a2 = 0;
    let b0 = 0;
    let b1 = 0;
    let b2 = 0;
    let c0 = 0;
    let c1 = 0;
    let c2 = 0;
    let at = p;
    for (let k = k0; k < k1; k++) {
      const e = energies[k];
      const a = values[at];
      const b = values[at + 1];
      const c = values[at + 2];
      const ae = a * e;
      const be = b * e;
      const ce = c * e;
      a0 += a;
      a1 += ae;
      a2 += ae * e;
      b0 += b;
      b1 += be;
      b2 += be * e;
      c0 += c;
      c1 += ce;
      c2 += ce * e;
      at += pixels;
    }
    out0[p] = a0;
    out1[p] = a1;
    out2[p] = a2;
    out0[p + 1] = b0;
    out1[p + 1] = b1;
    out2[p + 1] = b2;
    out0[p + 2] = c0;
    out1[p + 2] = c1;
    out2[p + 2] = c2;
  }
  for (let p = inThrees; p < pixels; p++) {
    let s0 = 0;
    let s1 = 0;
    let s2 = 0;
    let at = p;
    for (let k = k0; k < k1; k++) {
      const v = values[at];
      const ve = v * energies[k];
      s0 += v;
      s1 += ve;
      s2 += ve * energies[k];
      at += pixels;
    }
    out0[p] = s0;
    out1[p] = s1;
    out2[p] = s2;
  }
}

/** Σ v e³ and Σ v e⁴ of every pixel; (pixels) each, overwritten. */
export function highMoments(
  { values, pixels, k0, k1 }: TileRun,
  energies: Float64Array,
  out3: Float64Array,
  out4: Float64Array,
): void {
  const inPairs = pixels - (pixels % 2);
  for (let p = 0; p < inPairs; p += 2) {
    let a3 = 0;
    let a4 = 0;
    let b3 = 0;
    let b4 = 0;
    let at = p;
    for (let k = k0; k < k1; k++) {
      const e = energies[k];
      const cube = e * e * e;
      const a = values[at] * cube;
      const b = values[at + 1] * cube;
      a3 += a;
      a4 += a * e;
      b3 += b;
      b4 += b * e;
      at += pixels;
    }
    out3[p] = a3;
    out4[p] = a4;
    out3[p + 1] = b3;
    out4[p + 1] = b4;
  }
  for (let p = inPairs; p < pixels; p++) {
    let s3 = 0;
    let s4 = 0;
    let at = p;
    for (let k = k0; k < k1; k++) {
      const e = energies[k];
      const v = values[at] * (e * e * e);
      s3 += v;
      s4 += v * e;
      at += pixels;
    }
    out3[p] = s3;
    out4[p] = s4;
  }
}

/** No data as nothing: a sum then leaves it out. In place, over the first `length` values. */
export function zeroNoData(values: Float64Array, length: number): void {
  for (let i = 0; i < length; i++) {
    if (Number.isNaN(values[i])) values[i] = 0;
  }
}
