import type { BandStore } from './band-store.ts';
import { mapToPixel, type RasterGrid } from './raster-grid.ts';
import { getSceneGeometry } from './tile-geometry.ts';

/** A band to be probed, with the way from DN to physical values. */
export interface ProbedBand {
  path: string;
  scale: number;
  offset: number;
}

export interface ProbeValue {
  /** Digital number as stored; null where the band has no data. */
  dn: number | null;
  /** DN × scale + offset. */
  scaled: number | null;
}

export interface PixelProbe {
  /** Pixel of the scene's grid, 0-based from the top left. */
  col: number;
  row: number;
  /** Centre of that pixel in the scene's CRS. */
  x: number;
  y: number;
  /** In the order of the bands asked for. */
  values: ProbeValue[];
}

/**
 * The value of each band in the scene pixel that holds a WGS84 position; null when the position is outside the scene.
 * A coarser band gives the pixel of its own grid under that scene pixel's centre.
 */
export async function probePixel(
  request: { crs: string; grid: RasterGrid; bands: readonly ProbedBand[]; lon: number; lat: number },
  store: BandStore,
): Promise<PixelProbe | null> {
  const { grid, bands } = request;
  const [atCol, atRow] = getSceneGeometry(grid, request.crs).toPixel(request.lon, request.lat);
  const col = Math.floor(atCol);
  const row = Math.floor(atRow);
  // NaN, for a position the projection can't take, fails every comparison.
  if (!(col >= 0 && col < grid.width && row >= 0 && row < grid.height)) return null;
  const x = grid.originX + (col + 0.5) * grid.pixelWidth;
  const y = grid.originY - (row + 0.5) * grid.pixelHeight;
  const values = await Promise.all(
    bands.map(async (probed): Promise<ProbeValue> => {
      const dn = await readValue(await store.open(probed.path), x, y);
      return { dn, scaled: dn === null ? null : dn * probed.scale + probed.offset };
    }),
  );
  return { col, row, x, y, values };
}

async function readValue(band: Awaited<ReturnType<BandStore['open']>>, x: number, y: number): Promise<number | null> {
  const [atCol, atRow] = mapToPixel(band.grid, x, y);
  const col = Math.floor(atCol);
  const row = Math.floor(atRow);
  if (!(col >= 0 && col < band.grid.width && row >= 0 && row < band.grid.height)) return null;
  const [value] = await band.readWindow(0, col, row, 1, 1);
  return Number.isNaN(value) || value === band.nodata ? null : value;
}
