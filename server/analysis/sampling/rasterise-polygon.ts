import type { MultiPolygon, Polygon } from './polygon.ts';

/**
 * Finds the pixels whose centre lies inside a polygon, by the even-odd rule along scanlines.
 *
 * Pixel (column, row) covers [column, column + 1) × [row, row + 1) in pixel coordinates, y downwards; its centre is at
 * + 0.5. Intervals are half-open (a centre on a left or upper edge is in, on a right or lower edge out), so where
 * polygons share their edge vertices every centre belongs to exactly one of them. Parts outside the grid are cut off.
 *
 * @returns ascending flat indices row·width + column, each once.
 * @throws RangeError when the grid is empty or too large for 32-bit indices, or a coordinate is not finite.
 */
export function rasterisePolygon(polygon: Polygon, width: number, height: number): Uint32Array {
  if (!(width >= 1 && height >= 1) || !Number.isInteger(width) || !Number.isInteger(height)) {
    throw new RangeError(`A grid of whole pixels is needed, got ${width} × ${height}.`);
  }
  if (width * height > 0x100000000) throw new RangeError(`A grid of ${width} × ${height} has too many pixels.`);

  const { rowStart, crossings } = collectCrossings(polygon, height);
  let count = 0;
  forEachRun(rowStart, crossings, width, (_row, from, to) => (count += to - from));
  const pixels = new Uint32Array(count);
  let next = 0;
  forEachRun(rowStart, crossings, width, (row, from, to) => {
    for (let column = from; column < to; column++) pixels[next++] = row * width + column;
  });
  return pixels;
}

/**
 * Finds the pixels whose centre lies inside any part of a multipolygon; parts that overlap count once.
 * @returns ascending flat indices, each once.
 * @throws RangeError as `rasterisePolygon` does.
 */
export function rasteriseMultiPolygon(polygons: MultiPolygon, width: number, height: number): Uint32Array {
  const parts = polygons.map((polygon) => rasterisePolygon(polygon, width, height));
  if (parts.length === 1) return parts[0];
  const all = new Uint32Array(parts.reduce((sum, part) => sum + part.length, 0));
  let offset = 0;
  for (const part of parts) {
    all.set(part, offset);
    offset += part.length;
  }
  all.sort();
  let kept = 0;
  for (let i = 0; i < all.length; i++) {
    if (i === 0 || all[i] !== all[i - 1]) all[kept++] = all[i];
  }
  return all.slice(0, kept);
}

/**
 * The x of every edge on every row's centre line, sorted within the row; row r owns
 * crossings[rowStart[r]..rowStart[r+1]).
 */
function collectCrossings(polygon: Polygon, height: number): { rowStart: Uint32Array; crossings: Float64Array } {
  const rowStart = new Uint32Array(height + 1);
  forEachEdge(polygon, (_x0, y0, _x1, y1) => {
    const last = rowAtOrAfter(y1, height);
    for (let row = rowAtOrAfter(y0, height); row < last; row++) rowStart[row + 1]++;
  });
  for (let row = 0; row < height; row++) rowStart[row + 1] += rowStart[row];
  const crossings = new Float64Array(rowStart[height]);
  const filled = rowStart.slice(0, height);
  forEachEdge(polygon, (x0, y0, x1, y1) => {
    const last = rowAtOrAfter(y1, height);
    for (let row = rowAtOrAfter(y0, height); row < last; row++) {
      crossings[filled[row]++] = x0 + ((row + 0.5 - y0) / (y1 - y0)) * (x1 - x0);
    }
  });
  for (let row = 0; row < height; row++) {
    if (rowStart[row + 1] - rowStart[row] > 1) crossings.subarray(rowStart[row], rowStart[row + 1]).sort();
  }
  return { rowStart, crossings };
}

/**
 * Visits every non-horizontal edge from its upper to its lower end, so that two polygons get the same bits for a
 * shared edge.
 */
function forEachEdge(polygon: Polygon, visit: (x0: number, y0: number, x1: number, y1: number) => void): void {
  for (const ring of polygon) {
    for (let i = 0; i < ring.length; i++) {
      const [x0, y0] = ring[i];
      const [x1, y1] = ring[(i + 1) % ring.length];
      if (!Number.isFinite(x0) || !Number.isFinite(y0)) throw new RangeError(`Position ${i} is ${x0}, ${y0}.`);
      if (y0 < y1) visit(x0, y0, x1, y1);
      else if (y1 < y0) visit(x1, y1, x0, y0);
    }
  }
}

/** First row whose centre line is at or below y. */
function rowAtOrAfter(y: number, height: number): number {
  return Math.min(height, Math.max(0, Math.ceil(y - 0.5)));
}

function forEachRun(
  rowStart: Uint32Array,
  crossings: Float64Array,
  width: number,
  visit: (row: number, fromColumn: number, toColumn: number) => void,
): void {
  for (let row = 0; row + 1 < rowStart.length; row++) {
    for (let i = rowStart[row]; i + 1 < rowStart[row + 1]; i += 2) {
      const from = Math.max(0, Math.ceil(crossings[i] - 0.5));
      const to = Math.min(width, Math.ceil(crossings[i + 1] - 0.5));
      if (to > from) visit(row, from, to);
    }
  }
}
