/** A spectrum as an SVG path of few points: each pixel column keeps its least and greatest counts. */

export interface PathBox {
  readonly widthPx: number;
  readonly heightPx: number;
}

export interface SpectrumPath {
  readonly d: string;
  /** counts at the lower and upper edge of the box; NaN where there is no data at all */
  readonly low: number;
  readonly high: number;
}

/**
 * @param centresEv - (nk) ascending, eV
 * @param counts - (nk); NaN breaks the line
 */
export function spectrumPath(
  centresEv: Float64Array,
  counts: Float64Array,
  { widthPx, heightPx }: PathBox,
): SpectrumPath {
  let low = Number.POSITIVE_INFINITY;
  let high = Number.NEGATIVE_INFINITY;
  for (const value of counts) {
    if (!Number.isFinite(value)) continue;
    low = Math.min(low, value);
    high = Math.max(high, value);
  }
  if (low > high) return { d: '', low: Number.NaN, high: Number.NaN };
  const fromEv = centresEv[0] ?? 0;
  const spanEv = (centresEv[centresEv.length - 1] ?? 1) - fromEv || 1;
  const span = high - low || 1;
  const xOf = (energyEv: number): number => ((energyEv - fromEv) / spanEv) * widthPx;
  const yOf = (value: number): number => heightPx - ((value - low) / span) * heightPx;
  const parts: string[] = [];
  let isDown = false;
  for (let k = 0; k < counts.length; ) {
    const column = Math.floor(xOf(centresEv[k] ?? 0));
    let least = Number.POSITIVE_INFINITY;
    let greatest = Number.NEGATIVE_INFINITY;
    let last = Number.NaN;
    const start = k;
    while (k < counts.length && (k === start || Math.floor(xOf(centresEv[k] ?? 0)) === column)) {
      const value = counts[k] ?? Number.NaN;
      if (Number.isFinite(value)) {
        least = Math.min(least, value);
        greatest = Math.max(greatest, value);
      }
      last = value;
      k++;
    }
    if (least > greatest) {
      isDown = false;
      continue;
    }
    const x = xOf(centresEv[start] ?? 0).toFixed(1);
    const ends =
      Number.isFinite(last) && last - least < greatest - last
        ? [greatest, least]
        : [least, greatest];
    for (const value of new Set(ends)) {
      parts.push(`${isDown ? 'L' : 'M'}${x} ${yOf(value).toFixed(1)}`);
      isDown = true;
    }
  }
  return { d: parts.join(''), low, high };
}
