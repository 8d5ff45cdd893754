import { writeFile } from 'node:fs/promises';
import { join } from 'node:path';
import { drawHumanSamples } from './island/human-samples.ts';
import { generateIsland } from './island/generate-island.ts';
import type { HumanSample } from './island/human-samples.ts';
import type { IslandBand } from './island/island-types.ts';
import { writeGeoTiffFromRaw } from '../raster/raw-to-geotiff.ts';

export interface IslandFiles {
  scenes: { name: string; acquiredOn: string; bands: (Omit<IslandBand, 'dn'> & { path: string })[] }[];
  samples: HumanSample[];
  /** True class of each pixel, 1–10, row-major; the scenes' own grid. */
  trueClass: Uint8Array;
}

/**
 * Worker task: makes the Isle of Vennory and writes its bands as GeoTIFFs into a folder, one file a band.
 * @param task.wkt the reference system, EPSG:32628, as well-known text
 */
export default async function makeIslandFiles(task: { dir: string; wkt: string }): Promise<IslandFiles> {
  const island = generateIsland();
  const scenes: IslandFiles['scenes'] = [];
  for (const { name, acquiredOn, bands } of island.scenes) {
    const written: IslandFiles['scenes'][number]['bands'] = [];
    for (const { dn, ...band } of bands) {
      const path = join(task.dir, `vennory-${acquiredOn}-${band.role}.tif`);
      const rawPath = `${path}.raw`;
      await writeFile(rawPath, dn);
      const grid = {
        ...{ width: band.width, height: band.height, originX: island.originX, originY: island.originY },
        ...{ pixelWidth: band.gsdMeters, pixelHeight: band.gsdMeters },
      };
      await writeGeoTiffFromRaw(
        { rawPath, dtype: 'uint16', grid, wkt: task.wkt, nodata: band.nodata, description: band.name },
        path,
        { overviews: 'none' },
      );
      written.push({ ...band, path });
    }
    scenes.push({ name, acquiredOn, bands: written });
  }
  return { scenes, samples: drawHumanSamples(island), trueClass: island.trueClass };
}
