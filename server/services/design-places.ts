import type { Bounds, Polygon } from '../../shared/contracts/geometry.ts';
import { getCrsTransform } from '../raster/crs-transform.ts';
import { pixelToMap } from '../raster/raster-grid.ts';
import { getSceneGeometry } from '../raster/tile-geometry.ts';
import type { PlacedScene } from './run-scene.ts';

interface Pixel {
  pixelRow: number;
  pixelColumn: number;
}

function toDegrees(placed: PlacedScene, column: number, row: number): [number, number] {
  const [x, y] = pixelToMap(placed.grid, column, row);
  return getCrsTransform(placed.proj4).toLonLat(x, y);
}

/** Centre of a scene pixel, degrees. */
export function centreOf(placed: PlacedScene, { pixelRow, pixelColumn }: Pixel): [number, number] {
  return toDegrees(placed, pixelColumn + 0.5, pixelRow + 0.5);
}

/** Outline of the square of pixels that reaches `reach` pixels beyond one to each side. */
function outline(placed: PlacedScene, { pixelRow, pixelColumn }: Pixel, reach: number): Polygon {
  const [west, east] = [pixelColumn - reach, pixelColumn + 1 + reach];
  const [north, south] = [pixelRow - reach, pixelRow + 1 + reach];
  // Counter-clockwise, as RFC 7946 wants an outer ring.
  const corners = [
    [west, north],
    [west, south],
    [east, south],
    [east, north],
    [west, north],
  ] as const;
  return { type: 'Polygon', coordinates: [corners.map(([column, row]) => toDegrees(placed, column, row))] };
}

/** Where a point lies: outlines of its pixel, and of the 3 × 3 and 5 × 5 pixels around it. */
export function placePoint(placed: PlacedScene, point: Pixel & { lon: number; lat: number }) {
  const outline5 = outline(placed, point, 2);
  const lons = outline5.coordinates.flat().map(([lon]) => lon);
  const lats = outline5.coordinates.flat().map(([, lat]) => lat);
  const bounds: Bounds = [Math.min(...lons), Math.min(...lats), Math.max(...lons), Math.max(...lats)];
  return {
    position: [point.lon, point.lat] as [number, number],
    outline: outline(placed, point, 0),
    outline3: outline(placed, point, 1),
    outline5,
    bounds,
  };
}

/** The scene pixel that holds a position in degrees; null outside the scene. */
export function pixelAt({ grid, proj4 }: PlacedScene, lon: number, lat: number): Pixel | null {
  const [atColumn, atRow] = getSceneGeometry(grid, proj4).toPixel(lon, lat);
  const [pixelColumn, pixelRow] = [Math.floor(atColumn), Math.floor(atRow)];
  const isInside = pixelColumn >= 0 && pixelColumn < grid.width && pixelRow >= 0 && pixelRow < grid.height;
  return isInside ? { pixelColumn, pixelRow } : null;
}
