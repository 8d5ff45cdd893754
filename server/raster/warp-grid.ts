import {
  getMercatorLat,
  getMercatorLon,
  getTileBounds,
  intersectBounds,
  type SceneGeometry,
  type TileAddress,
} from './tile-geometry.ts';

/** For each pixel centre of a tile, row-major, where it falls in the scene. */
export interface WarpGrid {
  size: number;
  /** Scene column, from the outer corner of the first pixel; NaN where there is none. */
  cols: Float64Array;
  /** Scene row, likewise. */
  rows: Float64Array;
  /** Scene pixels a tile pixel spans, where tile and scene overlap. */
  pixelsPerTilePixel: number;
  /** Exact projections that were needed. */
  nExact: number;
}

/** Allowed interpolation error in scene pixels at the points where it is measured; the promise is a third of a pixel anywhere. */
const tolerancePixels = 0.125;
const firstCellPixels = 64;
const lastCellPixels = 4;

/**
 * Where the pixels of a Web Mercator tile fall in a scene: exact at the corners of cells, bilinear between them; a cell
 * is halved until its edge middles and centre agree with the exact place to an eighth of a scene pixel (of a tile pixel,
 * where that is the larger), and below four pixels is computed exactly.
 * Returns null when the tile misses the scene.
 */
export function buildWarpGrid(tile: TileAddress, scene: SceneGeometry): WarpGrid | null {
  const overlap = intersectBounds(getTileBounds(tile), scene.bounds);
  if (overlap === null) return null;
  const { size } = tile;
  const pixelsPerTilePixel = measureScale(tile, scene, overlap);
  const tolerance = tolerancePixels * Math.max(1, pixelsPerTilePixel);
  const cols = new Float64Array(size * size).fill(NaN);
  const rows = new Float64Array(size * size).fill(NaN);
  const nTiles = 2 ** tile.z;

  // Lattice positions count half tile pixels, so that corners are even and pixel centres odd.
  const stride = 2 * size + 1;
  const known = new Map<number, [number, number]>();
  const locate = (i: number, j: number): [number, number] => {
    const key = j * stride + i;
    let place = known.get(key);
    if (place === undefined) {
      const lon = getMercatorLon((tile.x + i / (2 * size)) / nTiles);
      const lat = getMercatorLat((tile.y + j / (2 * size)) / nTiles);
      place = scene.toPixel(lon, lat);
      known.set(key, place);
    }
    return place;
  };
  const isFarFromScene = (i: number, j: number, side: number): boolean =>
    intersectBounds(
      {
        west: getMercatorLon((tile.x + i / (2 * size)) / nTiles),
        east: getMercatorLon((tile.x + (i + side) / (2 * size)) / nTiles),
        north: getMercatorLat((tile.y + j / (2 * size)) / nTiles),
        south: getMercatorLat((tile.y + (j + side) / (2 * size)) / nTiles),
      },
      scene.bounds,
    ) === null;

  const fillExactly = (i: number, j: number, side: number): void => {
    for (let dj = 1; dj < side; dj += 2) {
      for (let di = 1; di < side; di += 2) {
        const at = ((j + dj - 1) / 2) * size + (i + di - 1) / 2;
        [cols[at], rows[at]] = locate(i + di, j + dj);
      }
    }
  };

  const fillCell = (i: number, j: number, side: number): void => {
    if (isFarFromScene(i, j, side)) return;
    if (side <= 2 * lastCellPixels) return fillExactly(i, j, side);
    const half = side / 2;
    const nw = locate(i, j);
    const ne = locate(i + side, j);
    const sw = locate(i, j + side);
    const se = locate(i + side, j + side);
    const error = Math.max(
      distanceFromMean(locate(i + half, j), nw, ne),
      distanceFromMean(locate(i + half, j + side), sw, se),
      distanceFromMean(locate(i, j + half), nw, sw),
      distanceFromMean(locate(i + side, j + half), ne, se),
      distanceFromMean(locate(i + half, j + half), mean(nw, ne), mean(sw, se)),
    );
    // A NaN error, from a point the projection can't take, must split the cell too.
    if (!(error <= tolerance)) {
      fillCell(i, j, half);
      fillCell(i + half, j, half);
      fillCell(i, j + half, half);
      fillCell(i + half, j + half, half);
      return;
    }
    interpolateCell(i / 2, j / 2, side / 2, [nw, ne, sw, se], size, cols, rows);
  };

  const step = 2 * firstCellPixels;
  for (let j = 0; j < 2 * size; j += step) {
    for (let i = 0; i < 2 * size; i += step) {
      fillCell(i, j, step);
    }
  }
  return { size, cols, rows, pixelsPerTilePixel, nExact: known.size };
}

function mean(a: [number, number], b: [number, number]): [number, number] {
  return [(a[0] + b[0]) / 2, (a[1] + b[1]) / 2];
}

function distanceFromMean(exact: [number, number], a: [number, number], b: [number, number]): number {
  return Math.hypot(exact[0] - (a[0] + b[0]) / 2, exact[1] - (a[1] + b[1]) / 2);
}

function interpolateCell(
  left: number,
  top: number,
  side: number,
  [nw, ne, sw, se]: [[number, number], [number, number], [number, number], [number, number]],
  size: number,
  cols: Float64Array,
  rows: Float64Array,
): void {
  for (let dy = 0; dy < side; dy++) {
    const v = (dy + 0.5) / side;
    const westCol = nw[0] + (sw[0] - nw[0]) * v;
    const westRow = nw[1] + (sw[1] - nw[1]) * v;
    const stepCol = (ne[0] + (se[0] - ne[0]) * v - westCol) / side;
    const stepRow = (ne[1] + (se[1] - ne[1]) * v - westRow) / side;
    let at = (top + dy) * size + left;
    for (let dx = 0; dx < side; dx++, at++) {
      cols[at] = westCol + stepCol * (dx + 0.5);
      rows[at] = westRow + stepRow * (dx + 0.5);
    }
  }
}

/** Scene pixels per tile pixel in the middle of the overlap: the smaller of the two axes, so that no detail is skipped. */
function measureScale(
  tile: TileAddress,
  scene: SceneGeometry,
  overlap: { west: number; south: number; east: number; north: number },
): number {
  const tileLon = 360 / 2 ** tile.z / tile.size;
  const lon = (overlap.west + overlap.east) / 2;
  const lat = (overlap.south + overlap.north) / 2;
  // A Mercator pixel is as many degrees high as wide, times the cosine of the latitude.
  const tileLat = tileLon * Math.cos((lat * Math.PI) / 180);
  const [col0, row0] = scene.toPixel(lon - tileLon / 2, lat);
  const [col1, row1] = scene.toPixel(lon + tileLon / 2, lat);
  const [col2, row2] = scene.toPixel(lon, Math.min(90, lat + tileLat / 2));
  const [col3, row3] = scene.toPixel(lon, Math.max(-90, lat - tileLat / 2));
  const scale = Math.min(Math.hypot(col1 - col0, row1 - row0), Math.hypot(col3 - col2, row3 - row2));
  return Number.isFinite(scale) && scale > 0 ? scale : 1;
}
