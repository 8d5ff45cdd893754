/** [west, south, east, north] in degrees. */
type Bounds = readonly [number, number, number, number];

const EQUATOR_METERS = 40_075_016.686;
const TILE_PIXELS = 256;
/** Zoom levels drawn past the scene's own, so that enlarged pixels keep their true edges. */
const LEVELS_PAST_NATIVE = 3;
const FINEST_ZOOM = 20;

/** Bounds a map can show: across the antimeridian (west > east) the east end goes on past 180°. */
export function unwrapBounds([west, south, east, north]: Bounds): [number, number, number, number] {
  return [west, south, west > east ? east + 360 : east, north];
}

/** The longitude at which a map that shows `bounds` (unwrapped) draws a place. */
export function unwrapLongitude(longitudeDeg: number, [west]: Bounds): number {
  return longitudeDeg < west && longitudeDeg + 360 - west < west - longitudeDeg ? longitudeDeg + 360 : longitudeDeg;
}

/** The finest zoom worth asking tiles for: three levels past the one where a tile's pixel is a scene's pixel. */
export function finestTileZoom(bounds: Bounds, heightPixels: number): number {
  const [, south, , north] = bounds;
  const middleDeg = (south + north) / 2;
  const pixelMeters = ((north - south) / 360) * (EQUATOR_METERS / heightPixels);
  const worldMeters = EQUATOR_METERS * Math.cos((middleDeg * Math.PI) / 180);
  const native = Math.ceil(Math.log2(worldMeters / (TILE_PIXELS * pixelMeters)));
  return Math.max(0, Math.min(FINEST_ZOOM, native + LEVELS_PAST_NATIVE));
}
