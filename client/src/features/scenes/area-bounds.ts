import type { ArealGeometry, Bounds } from '../../../../shared/contracts/geometry.ts';

/** West, south, east, north around an area that does not cross the antimeridian. */
export function areaBounds(geometry: ArealGeometry): Bounds {
  const polygons = geometry.type === 'Polygon' ? [geometry.coordinates] : geometry.coordinates;
  let [west, south, east, north] = [Infinity, Infinity, -Infinity, -Infinity];
  for (const [outline = []] of polygons) {
    for (const [lon, lat] of outline) {
      west = Math.min(west, lon);
      east = Math.max(east, lon);
      south = Math.min(south, lat);
      north = Math.max(north, lat);
    }
  }
  return [west, south, east, north];
}
