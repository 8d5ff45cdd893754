import type { SceneGeometry } from './tile-geometry.ts';

type PixelPosition = readonly [column: number, row: number];
export type PixelPolygon = readonly (readonly PixelPosition[])[];

/**
 * Rings of longitudes and latitudes as positions in the scene's pixels, from the outer corner of the upper left one.
 * Null when the scene's projection has no place for one of the positions.
 */
export function toPixelPolygon(
  rings: readonly (readonly (readonly [number, number])[])[],
  geometry: SceneGeometry,
): PixelPolygon | null {
  const converted = rings.map((ring) => ring.map(([lon, lat]): PixelPosition => geometry.toPixel(lon, lat)));
  const isPlaced = converted.every((ring) => ring.every(([x, y]) => Number.isFinite(x) && Number.isFinite(y)));
  return isPlaced ? converted : null;
}
