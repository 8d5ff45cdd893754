import type { SceneGeometry } from './tile-geometry.ts';

type PixelPosition = readonly [column: number, row: number];
type LonLat = readonly [lon: number, lat: number];
export type PixelPolygon = readonly (readonly PixelPosition[])[];

/** How far an edge may lie from where its projection truly runs, in pixels. */
const maxBendPixels = 0.05;
const maxHalvings = 12;

/**
 * Rings of longitudes and latitudes as positions in the scene's pixels, from the outer corner of the upper left one.
 * Edges are straight in longitude and latitude (RFC 7946, section 3.1.1), so a long one bends in the scene: it is halved until each
 * piece is within a twentieth of a pixel. Null when the scene's projection has no place for one of the positions.
 */
export function toPixelPolygon(rings: readonly (readonly LonLat[])[], geometry: SceneGeometry): PixelPolygon | null {
  const converted = rings.map((ring) => convertRing(ring, geometry));
  const isPlaced = converted.every((ring) => ring.every(([x, y]) => Number.isFinite(x) && Number.isFinite(y)));
  return isPlaced ? converted : null;
}

function convertRing(ring: readonly LonLat[], geometry: SceneGeometry): PixelPosition[] {
  const positions: PixelPosition[] = [];
  for (let i = 0; i < ring.length; i++) {
    const from = geometry.toPixel(...ring[i]);
    positions.push(from);
    if (i + 1 < ring.length) {
      addBends(ring[i], ring[i + 1], from, geometry.toPixel(...ring[i + 1]), geometry, maxHalvings, positions);
    }
  }
  return positions;
}

/** Adds the positions between two ends, without the ends. */
function addBends(
  from: LonLat,
  to: LonLat,
  fromPixel: PixelPosition,
  toPixel: PixelPosition,
  geometry: SceneGeometry,
  halvingsLeft: number,
  positions: PixelPosition[],
): void {
  const middle: LonLat = [(from[0] + to[0]) / 2, (from[1] + to[1]) / 2];
  const middlePixel = geometry.toPixel(...middle);
  const bend = Math.hypot(
    middlePixel[0] - (fromPixel[0] + toPixel[0]) / 2,
    middlePixel[1] - (fromPixel[1] + toPixel[1]) / 2,
  );
  // Not a number, where the projection has no place for the middle, ends here too.
  if (halvingsLeft === 0 || !(bend > maxBendPixels)) return;
  addBends(from, middle, fromPixel, middlePixel, geometry, halvingsLeft - 1, positions);
  positions.push(middlePixel);
  addBends(middle, to, middlePixel, toPixel, geometry, halvingsLeft - 1, positions);
}
