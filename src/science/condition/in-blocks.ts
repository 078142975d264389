/**
 * Steps and summaries a few rows at a time, so that a worker can look for a stop in between and say how
 * far it is. Same bits as all rows at once: a chain's results do not depend on how rows are shared out.
 */
import { RimlightError } from '../../errors';
import type { ChainPart, ChainPlan, PartResult } from './chain';
import { applyToPart, summarisePart } from './chain';
import { type ConditionedArray, type ConditionedSlab, zerosLike } from './conditioned';
import type { SpikeList } from './despike';
import type { RowSpan, StepMap, StepState, StepSummary } from './step-plan';

/**
 * One step on one holder's rows; yields the share done, 0 to 1.
 *
 * @param rowsPerBlock - rows of the step's result that are made between yields
 */
export function* applyInBlocks(
  plan: ChainPlan,
  index: number,
  part: ChainPart,
  state: StepState,
  rowsPerBlock: number,
): Generator<number, PartResult> {
  const given = part.rows.needed[index + 1];
  const own = part.rows.own[index + 1];
  const blocks = blocksOf(given, rowsPerBlock);
  const results: PartResult[] = [];
  for (const block of blocks) {
    const rows = {
      needed: part.rows.needed.with(index + 1, block),
      own: part.rows.own.with(index + 1, within(own, block)),
    };
    results.push(applyToPart(plan, index, { ...part, rows }, state));
    yield results.length / blocks.length;
  }
  return joinResults(results);
}

/** One holder's share of a round of summaries: to be merged with those of the others, in any order. */
export function* summariseInBlocks(
  plan: ChainPlan,
  index: number,
  part: ChainPart,
  round: number,
  state: StepState,
  rowsPerBlock: number,
): Generator<number, readonly StepSummary[]> {
  const blocks = blocksOf(part.rows.own[index], rowsPerBlock);
  let summaries: StepSummary[] = [];
  for (const [done, block] of blocks.entries()) {
    const rows = { ...part.rows, own: part.rows.own.with(index, block) };
    summaries.push(summarisePart(plan, index, { ...part, rows }, round, state));
    // Products are large, and add up exactly.
    if (summaries[0].kind === 'products') summaries = [addedProducts(summaries)];
    yield (done + 1) / blocks.length;
  }
  return summaries;
}

/** At least one, which is empty where there are no rows. */
function blocksOf({ y0, y1 }: RowSpan, rowsPerBlock: number): readonly RowSpan[] {
  const count = Math.max(1, Math.ceil((y1 - y0) / Math.max(1, rowsPerBlock)));
  return Array.from({ length: count }, (_, i) => ({
    y0: y0 + i * rowsPerBlock,
    y1: Math.min(y1, y0 + (i + 1) * rowsPerBlock),
  }));
}

function within(own: RowSpan, block: RowSpan): RowSpan {
  const y0 = Math.min(Math.max(own.y0, block.y0), block.y1);
  return { y0, y1: Math.max(y0, Math.min(own.y1, block.y1)) };
}

function addedProducts(summaries: readonly StepSummary[]): StepSummary {
  const [first, ...others] = summaries;
  if (first.kind !== 'products') return first;
  const sums = first.products.sums.slice();
  let { pixels } = first.products;
  for (const other of others) {
    if (other.kind !== 'products') continue;
    pixels += other.products.pixels;
    for (let at = 0; at < sums.length; at++) sums[at] += other.products.sums[at];
  }
  return { ...first, products: { sums, pixels } };
}

function joinResults(results: readonly PartResult[]): PartResult {
  const [first] = results;
  if (results.length === 1) return first;
  const tally: Record<string, number> = {};
  for (const result of results) {
    for (const [name, count] of Object.entries(result.tally)) {
      tally[name] = (tally[name] ?? 0) + count;
    }
  }
  return {
    slab: joinSlabs(results.map(({ slab }) => slab)),
    tally,
    maps: first.maps.map((_, i) => joinMaps(results.map(({ maps }) => maps[i]))),
    spikes: first.spikes === null ? null : joinSpikes(results.map(({ spikes }) => spikes)),
  };
}

/**
 * Slabs of rows that follow one another, as one.
 *
 * @throws RimlightError 'fault' - when they do not
 */
export function joinSlabs(slabs: readonly ConditionedSlab[]): ConditionedSlab {
  const [first] = slabs;
  let y = first.y0;
  for (const slab of slabs) {
    if (slab.y0 !== y) {
      throw new RimlightError('fault', {
        what: `rows from ${slab.y0} on do not follow row ${y - 1}`,
        where: '',
        hint: 'Please report this.',
      });
    }
    y += slab.shape.ny;
  }
  const { nx, nk } = first.shape;
  const length = (y - first.y0) * nx * nk;
  const join = (of: (slab: ConditionedSlab) => ConditionedArray | null): ConditionedArray => {
    const out = zerosLike(first.counts, length);
    for (const slab of slabs) out.set(of(slab) ?? [], (slab.y0 - first.y0) * nx * nk);
    return out;
  };
  return {
    ...first,
    shape: { ny: y - first.y0, nx, nk },
    counts: join(({ counts }) => counts),
    variances: first.variances === null ? null : join(({ variances }) => variances),
    background:
      first.background.kind === 'channel'
        ? first.background
        : { kind: 'pixel', values: join(({ background }) => background.values) },
    replaced: joinMarks(slabs, length),
  };
}

function joinMarks(slabs: readonly ConditionedSlab[], length: number): Uint8Array | null {
  if (slabs.every(({ replaced }) => replaced === null)) return null;
  const out = new Uint8Array(length);
  const { nx, nk } = slabs[0].shape;
  for (const { replaced, y0 } of slabs) {
    if (replaced !== null) out.set(replaced, (y0 - slabs[0].y0) * nx * nk);
  }
  return out;
}

function joinMaps(maps: readonly StepMap[]): StepMap {
  const values = new Float64Array(maps.reduce((sum, map) => sum + map.values.length, 0));
  let at = 0;
  for (const map of maps) {
    values.set(map.values, at);
    at += map.values.length;
  }
  return { ...maps[0], values };
}

function joinSpikes(lists: readonly (SpikeList | null)[]): SpikeList {
  const all = (of: (list: SpikeList) => ArrayLike<number>): number[] =>
    lists.flatMap((list) => (list === null ? [] : Array.from(of(list))));
  return {
    y: Int32Array.from(all(({ y }) => y)),
    x: Int32Array.from(all(({ x }) => x)),
    k: Int32Array.from(all(({ k }) => k)),
    was: Float64Array.from(all(({ was }) => was)),
  };
}
