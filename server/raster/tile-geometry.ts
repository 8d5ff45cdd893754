import { getCrsTransform } from './crs-transform.ts';
import type { RasterGrid } from './raster-grid.ts';
import { computeSceneExtent, type LonLatBounds } from './scene-extent.ts';

/** A tile of the WebMercatorQuad tile matrix set: row y counts from the north (OGC Two Dimensional Tile Matrix Set, 17-083r2). */
export interface TileAddress {
  z: number;
  x: number;
  y: number;
  /** Pixels a side: 256, or 512 for a dense display. */
  size: number;
}

/** Longitude of a position across the whole Web Mercator square, 0 west … 1 east. */
export function getMercatorLon(u: number): number {
  return u * 360 - 180;
}

/** Latitude of a position down the Web Mercator square, 0 north … 1 south (spherical; EPSG method 1024). */
export function getMercatorLat(v: number): number {
  return (Math.atan(Math.sinh(Math.PI * (1 - 2 * v))) * 180) / Math.PI;
}

/** WGS84 box of a tile; always west < east. */
export function getTileBounds({ z, x, y }: Omit<TileAddress, 'size'>): LonLatBounds {
  const n = 2 ** z;
  return {
    west: getMercatorLon(x / n),
    east: getMercatorLon((x + 1) / n),
    north: getMercatorLat(y / n),
    south: getMercatorLat((y + 1) / n),
  };
}

/** @throws {RangeError} when no such tile exists. */
export function validateTileAddress({ z, x, y, size }: TileAddress): void {
  const n = 2 ** z;
  const isWhole = [z, x, y].every(Number.isInteger);
  if (!isWhole || z < 0 || z > 24 || x < 0 || x >= n || y < 0 || y >= n || (size !== 256 && size !== 512)) {
    throw new RangeError(`no tile ${z}/${x}/${y} of ${size} pixels`);
  }
}

/** Overlap of a plain box with bounds that may lie across the antimeridian; in the box's own longitudes, or null. */
export function intersectBounds(box: LonLatBounds, bounds: LonLatBounds): LonLatBounds | null {
  const south = Math.max(box.south, bounds.south);
  const north = Math.min(box.north, bounds.north);
  if (south > north) return null;
  const boundsEast = bounds.east < bounds.west ? bounds.east + 360 : bounds.east;
  for (const turn of [0, -360, 360]) {
    const west = Math.max(box.west, bounds.west + turn);
    const east = Math.min(box.east, boundsEast + turn);
    if (west <= east) return { west, south, east, north };
  }
  return null;
}

/** A scene's grid with the exact way from WGS84 to its pixels. */
export interface SceneGeometry {
  grid: RasterGrid;
  /** WGS84 bounds, a little generous: the true edge between two sampled edge points may bulge. */
  bounds: LonLatBounds;
  /** Pixel position from the outer corner of the top-left pixel; NaN, NaN where the projection has no such point. */
  toPixel(lon: number, lat: number): [number, number];
}

const geometries = new Map<string, SceneGeometry>();
const maxCachedGeometries = 64;

/** The geometry of a scene, kept for the next tile. @throws {Error} when the CRS or the grid can't be placed on Earth. */
export function getSceneGeometry(grid: RasterGrid, projString: string): SceneGeometry {
  const key = [projString, ...listGridNumbers(grid)].join('|');
  let geometry = geometries.get(key);
  if (geometry === undefined) {
    geometry = createSceneGeometry(grid, projString);
    if (geometries.size >= maxCachedGeometries) geometries.clear();
    geometries.set(key, geometry);
  }
  return geometry;
}

function listGridNumbers({ width, height, originX, originY, pixelWidth, pixelHeight }: RasterGrid): number[] {
  return [width, height, originX, originY, pixelWidth, pixelHeight];
}

function createSceneGeometry(grid: RasterGrid, projString: string): SceneGeometry {
  const transform = getCrsTransform(projString);
  const { bounds } = computeSceneExtent(grid, projString);
  const centreLon = grid.originX + (grid.width * grid.pixelWidth) / 2;
  const toPixel = (lon: number, lat: number): [number, number] => {
    const [mapX, mapY] = transform.fromLonLat(lon, lat);
    // Longitudes repeat; the one within half a turn of the scene's middle is meant.
    const x = transform.isGeographic ? mapX + 360 * Math.round((centreLon - mapX) / 360) : mapX;
    return [(x - grid.originX) / grid.pixelWidth, (grid.originY - mapY) / grid.pixelHeight];
  };
  return { grid, bounds: growBounds(bounds), toPixel };
}

function growBounds({ west, south, east, north }: LonLatBounds): LonLatBounds {
  const spanLon = (east < west ? east + 360 : east) - west;
  const marginLon = spanLon * 0.01 + 1e-6;
  const marginLat = (north - south) * 0.01 + 1e-6;
  const lats = { south: Math.max(-90, south - marginLat), north: Math.min(90, north + marginLat) };
  if (spanLon + 2 * marginLon >= 360) return { west: -180, east: 180, ...lats };
  const wrap = (lon: number): number => (lon < -180 ? lon + 360 : lon > 180 ? lon - 360 : lon);
  return { west: wrap(west - marginLon), east: wrap(east + marginLon), ...lats };
}
