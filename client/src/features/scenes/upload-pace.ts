/** Bytes sent by a moment (milliseconds). */
export interface PacePoint {
  atMs: number;
  sentBytes: number;
}

/** The span the speed is measured over: long enough to be steady, short enough to follow the network. */
const WINDOW_MS = 8_000;
const SHORTEST_MS = 500;

/** The points of the last eight seconds with one more; the last point before them stays as their start. */
export function addPacePoint(points: readonly PacePoint[], point: PacePoint): PacePoint[] {
  const firstInside = points.findIndex(({ atMs }) => atMs >= point.atMs - WINDOW_MS);
  const kept = firstInside === -1 ? points.slice(-1) : points.slice(Math.max(0, firstInside - 1));
  return [...kept, point];
}

/** Bytes a second over the points; null while too little time has passed to say. */
export function bytesPerSecond(points: readonly PacePoint[]): number | null {
  const first = points[0];
  const last = points.at(-1);
  if (!first || !last || last.atMs - first.atMs < SHORTEST_MS) return null;
  return ((last.sentBytes - first.sentBytes) * 1000) / (last.atMs - first.atMs);
}

/** Seconds until the rest is sent at this pace; null when it cannot be said. */
export function secondsLeft(points: readonly PacePoint[], totalBytes: number): number | null {
  const speed = bytesPerSecond(points);
  const sent = points.at(-1)?.sentBytes ?? 0;
  return speed ? (totalBytes - sent) / speed : null;
}
