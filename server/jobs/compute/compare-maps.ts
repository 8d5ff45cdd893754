import { assignPixelsOnce } from '../../analysis/sampling/assign-pixels-once.ts';
import { rasterisePolygon } from '../../analysis/sampling/rasterise-polygon.ts';
import type { BandFile } from '../../raster/band-file.ts';
import { compareCodes, type ComparedCodes } from '../../raster/compare-codes.ts';
import type { ComputeTasks } from './tasks.ts';

/** Lays two class maps over each other; a pixel of several held-out polygons counts as in the accuracy figures. */
export function compareMapFiles(
  { grid, rowAreaM2, heldOut, rightCodes }: ComputeTasks['compare-maps']['input'],
  maps: readonly [BandFile, BandFile],
): Promise<ComparedCodes> {
  const owned = assignPixelsOnce(
    heldOut.map(({ id, classIndex, polygon }) => ({
      ...{ id, classIndex, pixels: rasterisePolygon(polygon, grid.width, grid.height) },
    })),
  );
  return compareCodes({ grid, rowAreaM2, owned, rightCodes }, maps);
}
