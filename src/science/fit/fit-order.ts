/**
 * The order in which pixels are fitted and what each begins with. First a coarse grid of nodes, one in
 * each block of 4 × 4 pixels, each from the plan's own start; then, row by row, the pixels between, each
 * from the pixel to its left and from the node of its block. A row depends on nodes and on itself
 * only, so results are the same however rows are shared out.
 */

/** Pixels between nodes, and where in its block a node lies: no pixel is more than two steps away from one. */
const spacing = 4;
const inset = 2;

/** How many nodes there are along `length` pixels. */
export function nodeCount(length: number): number {
  return Math.ceil(length / spacing);
}

/** The pixel of a node; the last one may lie nearer to its block's beginning. */
export function nodePixel(node: number, length: number): number {
  return Math.min(spacing * node + inset, length - 1);
}

/** The node of a pixel's block. */
export function nodeOf(pixel: number): number {
  return Math.floor(pixel / spacing);
}

export interface GridNode {
  /** number of the node on the scan's grid, rows first */
  readonly index: number;
  readonly y: number;
  readonly x: number;
}

/** Nodes in rows y0 ≤ y < y1. */
export function nodesInRows(
  { ny, nx }: { readonly ny: number; readonly nx: number },
  y0: number,
  y1: number,
): readonly GridNode[] {
  const across = nodeCount(nx);
  return Array.from({ length: nodeCount(ny) }, (_, row) => ({ row, y: nodePixel(row, ny) }))
    .filter(({ y }) => y >= y0 && y < y1)
    .flatMap(({ row, y }) =>
      Array.from({ length: across }, (_, column) => ({
        index: row * across + column,
        y,
        x: nodePixel(column, nx),
      })),
    );
}

/** Rows with nodes first, then halfway between, then the rest, so that a picture sharpens all over. */
const passes = [inset, 0, 1, 3];

/** Rows y0 ≤ y < y1 in the order they are fitted. */
export function rowsInOrder(y0: number, y1: number): readonly number[] {
  const rows = Array.from({ length: y1 - y0 }, (_, i) => y0 + i);
  return passes.flatMap((pass) => rows.filter((y) => y % spacing === pass));
}
