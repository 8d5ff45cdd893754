import type { Polygon, Position, Ring } from './polygon.ts';

export type ShapeProblem =
  | 'too-few-positions'
  | 'not-finite'
  | 'not-closed'
  | 'zero-area'
  | 'self-crossing'
  | 'hole-outside'
  | 'hole-crossing'
  | 'too-intricate';

/** Pairs of segments looked at for crossings: about half a second of work, a thousand times what a lake of islands needs. */
const maxPairs = 100_000_000;

/** A rejected drawing is a result, not an exception; `at` is where the fault lies, `ringIndex` 0 is the outer ring. */
export type ShapeCheck = { ok: true } | { ok: false; reason: ShapeProblem; ringIndex: number; at: [number, number] };

/**
 * Checks that a polygon can be used as a sample: rings closed, of at least four finite positions and some area, not
 * touching or crossing themselves or each other, and holes inside the outer ring. Rings may run either way round.
 */
export function checkPolygonShape(polygon: Polygon): ShapeCheck {
  if (polygon.length === 0) return fail('too-few-positions', 0, [0, 0]);
  for (let r = 0; r < polygon.length; r++) {
    const check = checkRing(polygon[r], r);
    if (!check.ok) return check;
  }
  const crossing = findRingCrossing(polygon);
  if (crossing === 'too-intricate') return fail('too-intricate', 0, polygon[0][0]);
  if (crossing) {
    const reason = crossing.sameRing ? 'self-crossing' : 'hole-crossing';
    return fail(reason, crossing.ringIndex, crossing.at);
  }
  for (let r = 1; r < polygon.length; r++) {
    // No ring crosses another here, so one position of a hole speaks for the whole of it.
    const inOuter = isInsideRing(polygon[r][0], polygon[0]);
    const inOther = polygon.some((ring, other) => other > 0 && other !== r && isInsideRing(polygon[r][0], ring));
    if (!inOuter || inOther) return fail('hole-outside', r, polygon[r][0]);
  }
  return { ok: true };
}

/**
 * Signed area of a closed ring: positive when the ring runs counter-clockwise with y upwards. In squared coordinate
 * units.
 */
export function signedRingArea(ring: Ring): number {
  // Relative to the first position, so that large map coordinates do not eat the digits.
  const [ox, oy] = ring[0];
  let sum = 0;
  for (let i = 0; i + 1 < ring.length; i++) {
    sum += (ring[i][0] - ox) * (ring[i + 1][1] - oy) - (ring[i + 1][0] - ox) * (ring[i][1] - oy);
  }
  return sum / 2;
}

/** Whether a position is inside a ring (even-odd; half-open on edges). */
export function isInsideRing([x, y]: Position, ring: Ring): boolean {
  let inside = false;
  for (let i = 0; i + 1 < ring.length; i++) {
    const [x0, y0] = ring[i];
    const [x1, y1] = ring[i + 1];
    if (y0 <= y !== y1 <= y && x < x0 + ((y - y0) / (y1 - y0)) * (x1 - x0)) inside = !inside;
  }
  return inside;
}

function checkRing(ring: Ring, ringIndex: number): ShapeCheck {
  const bad = ring.find(([x, y]) => !Number.isFinite(x) || !Number.isFinite(y));
  if (bad) return fail('not-finite', ringIndex, bad);
  if (ring.length < 4) return fail('too-few-positions', ringIndex, ring[0] ?? [0, 0]);
  const last = ring[ring.length - 1];
  if (ring[0][0] !== last[0] || ring[0][1] !== last[1]) return fail('not-closed', ringIndex, last);
  const far = farthestFrom(ring);
  const isDegenerate = ring.every((p) => cross(ring[0], far, p) === 0);
  return isDegenerate ? fail('zero-area', ringIndex, ring[0]) : { ok: true };
}

interface Segment {
  from: Position;
  to: Position;
  ringIndex: number;
  index: number;
  /** Index of the segment after this one in its ring. */
  next: number;
}

/** Where the rings of a polygon meet; `sameRing` when one crosses or touches itself. */
export interface RingCrossing {
  ringIndex: number;
  at: Position;
  sameRing: boolean;
}

/**
 * Finds where closed rings cross or touch themselves or each other; null when they do not. Sweeps segments by their left end and
 * tests those whose boxes overlap: quick for outlines of real things, quadratic for combs of long teeth, so it
 * gives up on those after `maxPairs` pairs.
 */
export function findRingCrossing(polygon: Polygon): RingCrossing | 'too-intricate' | null {
  const segments = polygon.flatMap(segmentsOf).sort((a, b) => leftOf(a) - leftOf(b));
  const n = segments.length;
  const [right, low, high] = [new Float64Array(n), new Float64Array(n), new Float64Array(n)];
  const active = new Int32Array(n);
  let nActive = 0;
  let nPairs = 0;
  for (let i = 0; i < n; i++) {
    const segment = segments[i];
    const left = leftOf(segment);
    right[i] = Math.max(segment.from[0], segment.to[0]);
    low[i] = Math.min(segment.from[1], segment.to[1]);
    high[i] = Math.max(segment.from[1], segment.to[1]);
    nPairs += nActive;
    if (nPairs > maxPairs) return 'too-intricate';
    let nKept = 0;
    for (let k = 0; k < nActive; k++) {
      const j = active[k];
      if (right[j] < left) continue;
      active[nKept++] = j;
      if (high[j] < low[i] || low[j] > high[i]) continue;
      const other = segments[j];
      const at = meetingPoint(segment, other);
      if (!at) continue;
      const ringIndex = Math.max(segment.ringIndex, other.ringIndex);
      return { ringIndex, at, sameRing: segment.ringIndex === other.ringIndex };
    }
    active[nKept++] = i;
    nActive = nKept;
  }
  return null;
}

function leftOf({ from, to }: Segment): number {
  return Math.min(from[0], to[0]);
}

function segmentsOf(ring: Ring, ringIndex: number): Segment[] {
  // A position repeated at once (a double click) is harmless and would make segments of no length.
  const positions = ring.filter(([x, y], i) => i === 0 || x !== ring[i - 1][0] || y !== ring[i - 1][1]);
  const count = positions.length - 1;
  return Array.from({ length: count }, (_, index) => {
    return { from: positions[index], to: positions[index + 1], ringIndex, index, next: (index + 1) % count };
  });
}

/** Where two segments meet although they should not; neighbours may share their common end but nothing more. */
function meetingPoint(s: Segment, t: Segment): Position | null {
  const sameRing = s.ringIndex === t.ringIndex;
  if (sameRing && (s.next === t.index || t.next === s.index)) {
    const [first, second] = s.next === t.index ? [s, t] : [t, s];
    return foldsBack(first, second) ? first.to : null;
  }
  const a = Math.sign(cross(s.from, s.to, t.from));
  const b = Math.sign(cross(s.from, s.to, t.to));
  const c = Math.sign(cross(t.from, t.to, s.from));
  const d = Math.sign(cross(t.from, t.to, s.to));
  if (a * b < 0 && c * d < 0) {
    const along = cross(t.from, t.to, s.from) / (cross(t.from, t.to, s.from) - cross(t.from, t.to, s.to));
    return [s.from[0] + along * (s.to[0] - s.from[0]), s.from[1] + along * (s.to[1] - s.from[1])];
  }
  if (a === 0 && isWithinBox(t.from, s)) return t.from;
  if (b === 0 && isWithinBox(t.to, s)) return t.to;
  if (c === 0 && isWithinBox(s.from, t)) return s.from;
  if (d === 0 && isWithinBox(s.to, t)) return s.to;
  return null;
}

/** Whether the second of two consecutive segments runs back over the first (a spike). */
function foldsBack(first: Segment, second: Segment): boolean {
  if (cross(first.from, first.to, second.to) !== 0) return false;
  const dot =
    (first.to[0] - first.from[0]) * (second.to[0] - second.from[0]) +
    (first.to[1] - first.from[1]) * (second.to[1] - second.from[1]);
  return dot < 0;
}

function isWithinBox([x, y]: Position, { from, to }: Segment): boolean {
  return (
    x >= Math.min(from[0], to[0]) &&
    x <= Math.max(from[0], to[0]) &&
    y >= Math.min(from[1], to[1]) &&
    y <= Math.max(from[1], to[1])
  );
}

/** Twice the signed area of the triangle a, b, p: positive when p is left of a → b with y upwards. */
function cross(a: Position, b: Position, p: Position): number {
  return (b[0] - a[0]) * (p[1] - a[1]) - (b[1] - a[1]) * (p[0] - a[0]);
}

function farthestFrom(ring: Ring): Position {
  const [ox, oy] = ring[0];
  let best = ring[0];
  let bestDistance = 0;
  for (const p of ring) {
    const distance = (p[0] - ox) ** 2 + (p[1] - oy) ** 2;
    if (distance > bestDistance) [best, bestDistance] = [p, distance];
  }
  return best;
}

function fail(reason: ShapeProblem, ringIndex: number, at: Position): ShapeCheck {
  return { ok: false, reason, ringIndex, at: [at[0], at[1]] };
}
