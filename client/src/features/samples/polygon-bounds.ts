import type { Bounds, Polygon } from '../../../../shared/contracts/geometry.ts';

/** West, south, east, north around outlines; null without any. */
export function polygonBounds(outlines: readonly Polygon[]): Bounds | null {
  let [west, south, east, north] = [Infinity, Infinity, -Infinity, -Infinity];
  for (const outline of outlines) {
    for (const [lon, lat] of outline.coordinates[0] ?? []) {
      west = Math.min(west, lon);
      east = Math.max(east, lon);
      south = Math.min(south, lat);
      north = Math.max(north, lat);
    }
  }
  return west > east ? null : [west, south, east, north];
}
