/** Where the hung maps hang: each as near above its interval as its neighbours allow. */

export interface HangRequest {
  /** wanted centre of each tile, px, in order of energy */
  readonly centresPx: readonly number[];
  /** width each tile takes with its caption and gap, px */
  readonly slotPx: number;
  /** room from … to, px */
  readonly fromPx: number;
  readonly toPx: number;
}

/**
 * Left ends of the slots: in the given order, none overlapping, none outside the room while it
 * suffices, each pushed no further than its neighbours force it.
 */
export function hangTiles({ centresPx, slotPx, fromPx, toPx }: HangRequest): readonly number[] {
  const lefts: number[] = [];
  let free = fromPx;
  for (const centre of centresPx) {
    const left = Math.max(free, centre - slotPx / 2);
    lefts.push(left);
    free = left + slotPx;
  }
  let limit = toPx - slotPx;
  for (let index = lefts.length - 1; index >= 0; index--) {
    const left = Math.min(lefts[index] ?? 0, limit);
    lefts[index] = Math.max(left, fromPx + index * slotPx);
    limit = left - slotPx;
  }
  return lefts;
}

/** The tie from under a tile to its interval: down, across, down. */
export function tiePath(
  tile: { x: number; y: number },
  interval: { x: number; y: number },
): string {
  const drop = (interval.y - tile.y) * 0.75;
  return `M${tile.x} ${tile.y} C ${tile.x} ${tile.y + drop}, ${interval.x} ${interval.y - drop}, ${interval.x} ${interval.y}`;
}
