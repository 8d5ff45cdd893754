import { getCrsTransform, wrapLongitude } from './crs-transform.ts';
import { pixelToMap, type RasterGrid } from './raster-grid.ts';

type Position = [number, number];

/** GeoJSON outline in WGS84 (RFC 7946); a scene across the antimeridian is cut there into a MultiPolygon. */
export type Footprint =
  { type: 'Polygon'; coordinates: Position[][] } | { type: 'MultiPolygon'; coordinates: Position[][][] };

/** WGS84 degrees; `west` > `east` when the scene lies across the antimeridian (RFC 7946, section 5.2). */
export interface LonLatBounds {
  west: number;
  south: number;
  east: number;
  north: number;
}

export interface SceneExtent {
  footprint: Footprint;
  bounds: LonLatBounds;
}

const pointsPerSide = 20;

/**
 * Outline and bounds of a grid in WGS84, from its edges in 20 pieces a side; corners are pixel corners.
 * A grid that holds a pole gets the whole parallel as its outline, since a ring on a lon/lat plane can't hold one.
 * @throws {Error} when an edge point has no WGS84 position.
 */
export function computeSceneExtent(grid: RasterGrid, projString: string): SceneExtent {
  const transform = getCrsTransform(projString);
  const ring: Position[] = [];
  for (const [col, row] of listEdgePoints(grid)) {
    const [x, y] = pixelToMap(grid, col, row);
    const [lon, lat] = transform.isGeographic ? [x, y] : transform.toLonLat(x, y);
    if (Number.isNaN(lon) || Number.isNaN(lat)) throw new Error(`the grid's edge at ${x}, ${y} has no WGS84 position`);
    ring.push([lon, Math.max(-90, Math.min(90, lat))]);
  }
  if (!transform.isGeographic) unwrap(ring);
  const turns = Math.round((ring.at(-1)![0] - ring[0][0]) / 360);
  if (turns !== 0) return extentAroundPole(ring);

  const lons = ring.map((point) => point[0]);
  const lats = ring.map((point) => point[1]);
  const westRaw = Math.min(...lons);
  const eastRaw = Math.max(...lons);
  const south = Math.min(...lats);
  const north = Math.max(...lats);
  if (eastRaw - westRaw >= 360 - 1e-9) {
    const bounds = { west: -180, south, east: 180, north };
    return { bounds, footprint: boxFootprint(bounds) };
  }
  const shift = 360 * Math.floor((westRaw + 180) / 360);
  const shifted = ring.map(([lon, lat]): Position => [lon - shift, lat]);
  const west = westRaw - shift;
  const east = eastRaw - shift;
  if (east <= 180) {
    return {
      bounds: { west, south, east, north },
      footprint: { type: 'Polygon', coordinates: [closeRing(shifted)] },
    };
  }
  const here = clipRing(shifted, 180, 'below');
  const beyond = clipRing(shifted, 180, 'above').map(([lon, lat]): Position => [lon - 360, lat]);
  return {
    bounds: { west, south, east: wrapLongitude(east), north },
    footprint: { type: 'MultiPolygon', coordinates: [[closeRing(here)], [closeRing(beyond)]] },
  };
}

/** Anticlockwise on the map: down the west edge, along the south, up the east, back along the north; first point repeated. */
function listEdgePoints(grid: RasterGrid): Position[] {
  const { width, height } = grid;
  const points: Position[] = [];
  const addSide = (fromCol: number, fromRow: number, toCol: number, toRow: number): void => {
    for (let i = 0; i < pointsPerSide; i++) {
      const t = i / pointsPerSide;
      points.push([fromCol + (toCol - fromCol) * t, fromRow + (toRow - fromRow) * t]);
    }
  };
  addSide(0, 0, 0, height);
  addSide(0, height, width, height);
  addSide(width, height, width, 0);
  addSide(width, 0, 0, 0);
  points.push([0, 0]);
  return points;
}

/** Makes neighbouring longitudes differ by less than half a turn, leaving the ±180 range where the ring does. */
function unwrap(ring: Position[]): void {
  for (let i = 1; i < ring.length; i++) {
    ring[i][0] += 360 * Math.round((ring[i - 1][0] - ring[i][0]) / 360);
  }
}

function extentAroundPole(ring: Position[]): SceneExtent {
  const lats = ring.map((point) => point[1]);
  const meanLat = lats.reduce((sum, lat) => sum + lat, 0) / lats.length;
  const bounds =
    meanLat > 0
      ? { west: -180, south: Math.min(...lats), east: 180, north: 90 }
      : { west: -180, south: -90, east: 180, north: Math.max(...lats) };
  return { bounds, footprint: boxFootprint(bounds) };
}

function boxFootprint({ west, south, east, north }: LonLatBounds): Footprint {
  const middle = (west + east) / 2;
  const ring: Position[] = [
    [west, north],
    [west, south],
    [middle, south],
    [east, south],
    [east, north],
    [middle, north],
    [west, north],
  ];
  return { type: 'Polygon', coordinates: [ring] };
}

function closeRing(points: Position[]): Position[] {
  const first = points[0];
  const last = points.at(-1)!;
  return first[0] === last[0] && first[1] === last[1] ? points : [...points, [first[0], first[1]]];
}

/** The part of a ring on one side of a meridian (Sutherland and Hodgman 1974, one clip edge). */
function clipRing(ring: Position[], lonCut: number, side: 'below' | 'above'): Position[] {
  const isInside = (lon: number): boolean => (side === 'below' ? lon <= lonCut : lon >= lonCut);
  const clipped: Position[] = [];
  for (let i = 1; i < ring.length; i++) {
    const [lonA, latA] = ring[i - 1];
    const [lonB, latB] = ring[i];
    if (isInside(lonA) !== isInside(lonB)) {
      clipped.push([lonCut, latA + ((latB - latA) * (lonCut - lonA)) / (lonB - lonA)]);
    }
    if (isInside(lonB)) clipped.push([lonB, latB]);
  }
  return clipped;
}
