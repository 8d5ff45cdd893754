import type { Polygon, Position } from './polygon.ts';
import { signedRingArea } from './polygon-shape.ts';

/** How far outlines lie within the pixels' outer edges, pixels: so that two corners that meet do not touch. */
const INSET = 0.02;

/** East, south, west, north as steps of columns and rows. */
const STEPS = [
  [1, 0],
  [0, 1],
  [-1, 0],
  [0, -1],
] as const;

/**
 * The outline of a region of pixels that hang together by their sides: one polygon of an outer ring and a ring for each hole, in
 * pixels from the window's upper left corner, just within the pixels' edges, closed. `null` for an empty region.
 */
export function traceRegion(region: Uint8Array, width: number, height: number): Polygon | null {
  const isIn = (column: number, row: number): boolean =>
    column >= 0 && row >= 0 && column < width && row < height && region[row * width + column] === 1;
  /** Edges walked with the region on their right; four directions at each grid corner. */
  const isWalked = new Uint8Array((width + 1) * (height + 1) * 4);
  const rings: Position[][] = [];
  for (let row = 0; row <= height; row++) {
    for (let column = 0; column < width; column++) {
      // An eastward edge has the region below it, on its right, and nothing of it above.
      if (!isIn(column, row) || isIn(column, row - 1)) continue;
      if (isWalked[(row * (width + 1) + column) * 4] === 1) continue;
      rings.push(walkRing(column, row, width, isIn, isWalked));
    }
  }
  if (rings.length === 0) return null;
  // Rows grow downwards, so the outer ring is the one of the largest extent whichever way it turns.
  return rings.sort((a, b) => Math.abs(signedRingArea(b)) - Math.abs(signedRingArea(a)));
}

function walkRing(
  fromColumn: number,
  fromRow: number,
  width: number,
  isIn: (column: number, row: number) => boolean,
  isWalked: Uint8Array,
): Position[] {
  const corners: Position[] = [];
  let [column, row, direction] = [fromColumn, fromRow, 0];
  do {
    isWalked[(row * (width + 1) + column) * 4 + direction] = 1;
    const [dx, dy] = STEPS[direction];
    column += dx;
    row += dy;
    const next = turnAt(column, row, direction, isIn);
    if (next !== direction) corners.push(insetCorner(column, row, direction, next));
    direction = next;
  } while (column !== fromColumn || row !== fromRow || direction !== 0);
  return [...corners, corners[0]];
}

/** The direction to go on in at a corner: right where the region ends ahead, left where it bulges, so that pixels that only touch at corners stay apart. */
function turnAt(
  column: number,
  row: number,
  direction: number,
  isIn: (column: number, row: number) => boolean,
): number {
  // The two pixels ahead of the corner, to the right and to the left of the way.
  const [right, left] = AHEAD[direction].map(([dx, dy]) => isIn(column + dx, row + dy));
  if (!right) return (direction + 1) % 4;
  return left ? (direction + 3) % 4 : direction;
}

/** For each direction, where from a grid corner the pixels ahead lie: on the right, on the left. */
const AHEAD = [
  [
    [0, 0],
    [0, -1],
  ],
  [
    [-1, 0],
    [0, 0],
  ],
  [
    [-1, -1],
    [-1, 0],
  ],
  [
    [0, -1],
    [-1, -1],
  ],
] as const;

/** The corner moved into the region, which lies on the right of the way in and of the way out. */
function insetCorner(column: number, row: number, from: number, to: number): Position {
  const [ax, ay] = STEPS[(from + 1) % 4];
  const [bx, by] = STEPS[(to + 1) % 4];
  return [column + INSET * (ax + bx), row + INSET * (ay + by)];
}
