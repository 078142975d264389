/** How densely sums are kept: as densely as a quarter of the cube's memory allows. */

/** What the memory of the sums depends on; the same for every slab of a scan, so that bits do not differ between slabs. */
export interface SumsNeed {
  readonly nk: number;
  /** bytes of one channel's counts as held in memory, at least */
  readonly bytesPerChannel: number;
  /** whether every number is there, whole and not negative, by their type in the file */
  readonly isUnsigned: boolean;
  /** the highest number the type in the file holds */
  readonly mostCounts: number;
  /** whether variances need sums of their own */
  readonly hasOwnVariance: boolean;
}

/** Channel edges at which sums over all channels below are kept. */
export interface BlockLayout {
  /** ascending, 0 < edge ≤ nk, the last is nk; (B) */
  readonly edges: Int32Array;
  /** every so many-th edge, and the last, also keeps third and fourth moments of the variance */
  readonly coarseEvery: number;
  /** widest band, in whole channels, that is summed channel by channel instead: as much work, and more exact */
  readonly spanChannels: number;
  /** the same for third and fourth moments */
  readonly coarseSpanChannels: number;
}

/** Share of the cube all sums together may take; the promise is a quarter. */
const shareOfCube = 0.245;
const coarseEvery = 4;
/** Finer does not pay: reading the sums then costs more than adding the channels. */
const shortestBlock = 32;
const fewestBlocks = 3;

/** Bytes per pixel that do not depend on the number of blocks. */
function fixedBytes({ bytesPerChannel, isUnsigned, hasOwnVariance }: SumsNeed): number {
  const edge = momentsBytes(hasOwnVariance) + 2 * bytesPerChannel;
  return 2 * edge + (isUnsigned ? 0 : flagBytes + scaleBytes);
}

/** Whether the counts of a whole spectrum fit a 32-bit whole number, by their type. */
export function hasSmallTotals({ nk, isUnsigned, mostCounts }: SumsNeed): boolean {
  return isUnsigned && nk * mostCounts <= 0xffffffff;
}

const flagBytes = 1;
const scaleBytes = 8;
/** of the place of a block's highest channel */
const placeBytes = 2;

/** Zeroth to second moments of the counts, and of variances where they have their own. */
function momentsBytes(hasOwnVariance: boolean): number {
  return 8 * (hasOwnVariance ? 6 : 3);
}

/**
 * The layout for a scan.
 *
 * @returns null when there are too few channels for sums to pay; bands are then summed channel by channel
 */
export function blockLayout(need: SumsNeed): BlockLayout | null {
  const { nk, bytesPerChannel, hasOwnVariance } = need;
  const budget = shareOfCube * nk * bytesPerChannel - fixedBytes(need);
  const saved = hasSmallTotals(need) ? 4 : 0;
  const perBlock = momentsBytes(hasOwnVariance) - saved + bytesPerChannel + placeBytes;
  const coarse = 16;
  // One coarse edge may come on top: the last one.
  const affordable = Math.floor((budget - coarse) / (perBlock + coarse / coarseEvery));
  const blocks = Math.min(affordable, Math.ceil(nk / shortestBlock));
  if (blocks < fewestBlocks) return null;
  const length = Math.ceil(nk / blocks);
  const edges = Int32Array.from({ length: Math.ceil(nk / length) }, (_, block) =>
    Math.min(nk, (block + 1) * length),
  );
  return {
    edges,
    coarseEvery,
    spanChannels: length,
    coarseSpanChannels: (coarseEvery * length) >> 1,
  };
}

/** Whether edge number `index` keeps third and fourth moments. */
export function isCoarse({ edges, coarseEvery: every }: BlockLayout, index: number): boolean {
  return index === edges.length - 1 || index % every === every - 1;
}
