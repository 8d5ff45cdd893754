/** A point in fractional pixels: column, row; pixel corners at whole numbers. */
export type Point = readonly [x: number, y: number];

function cross(o: Point, a: Point, b: Point): number {
  return (a[0] - o[0]) * (b[1] - o[1]) - (a[1] - o[1]) * (b[0] - o[0]);
}

function segmentsCross(a: Point, b: Point, c: Point, d: Point): boolean {
  const s1 = Math.sign(cross(a, b, c));
  const s2 = Math.sign(cross(a, b, d));
  const s3 = Math.sign(cross(c, d, a));
  const s4 = Math.sign(cross(c, d, b));
  return s1 !== s2 && s3 !== s4;
}

/** True when a point lies inside an open ring (even–odd rule). */
function contains(ring: readonly Point[], x: number, y: number): boolean {
  let inside = false;
  for (let i = 0, j = ring.length - 1; i < ring.length; j = i++) {
    const [xi, yi] = ring[i];
    const [xj, yj] = ring[j];
    if (yi > y !== yj > y && x < ((xj - xi) * (y - yi)) / (yj - yi) + xi) inside = !inside;
  }
  return inside;
}

/** West, north, east and south limits of a ring. */
function limitsOf(ring: readonly Point[]): [west: number, north: number, east: number, south: number] {
  const xs = ring.map((p) => p[0]);
  const ys = ring.map((p) => p[1]);
  return [Math.min(...xs), Math.min(...ys), Math.max(...xs), Math.max(...ys)];
}

/** True when two simple open rings share any area or touch. */
export function ringsOverlap(a: readonly Point[], b: readonly Point[]): boolean {
  const la = limitsOf(a);
  const lb = limitsOf(b);
  if (la[0] > lb[2] || lb[0] > la[2] || la[1] > lb[3] || lb[1] > la[3]) return false;
  for (let i = 0; i < a.length; i++) {
    for (let j = 0; j < b.length; j++) {
      if (segmentsCross(a[i], a[(i + 1) % a.length], b[j], b[(j + 1) % b.length])) return true;
    }
  }
  return contains(a, b[0][0], b[0][1]) || contains(b, a[0][0], a[0][1]);
}

/** Pixels (row-major in a grid `width` wide) whose centres lie inside an open ring. */
export function pixelsInside(ring: readonly Point[], width: number, height: number): number[] {
  const [west, north, east, south] = limitsOf(ring);
  const pixels: number[] = [];
  for (let y = Math.max(0, Math.floor(north)); y <= Math.min(height - 1, Math.ceil(south)); y++) {
    for (let x = Math.max(0, Math.floor(west)); x <= Math.min(width - 1, Math.ceil(east)); x++) {
      if (contains(ring, x + 0.5, y + 0.5)) pixels.push(y * width + x);
    }
  }
  return pixels;
}
