import { NODATA_CODE } from '../../shared/constants/class-codes.ts';
import type { App } from '../app-context.ts';
import type { Run, RunResult } from '../entities/run.ts';
import { NotFound } from '../errors.ts';
import { probePixel } from '../raster/probe.ts';
import { requireResult } from './accuracy.ts';
import { readColour } from './class-colour.ts';
import { placeScene, type PlacedScene } from './run-scene.ts';
import { checkTileAddress, describeCaching, drawEmptyTile, type PlannedTile, type TileAddress } from './tiles.ts';

/** Grid of a run's scene. @throws NotFound once the scene is not ready */
export function requirePlace(run: Run): PlacedScene {
  const placed = placeScene(run.scene);
  if (!placed) throw new NotFound();
  return placed;
}

/**
 * Plans a Web Mercator tile of the class map in its class colours. Post-processing changes a run's map, so a browser may keep
 * tiles for good only where the address names the map's digest.
 * @param named the digest in the address
 * @param map another map of the run than its current one
 * @throws NotFound without a map, or for a tile that does not exist
 */
export function planClassTile(
  app: App,
  run: Run,
  address: TileAddress,
  {
    named,
    hiddenCodes = [],
    map = requireResult(run),
  }: {
    named?: string | undefined;
    hiddenCodes?: readonly number[];
    map?: Pick<RunResult, 'mapKey' | 'classMapSha256'>;
  },
): PlannedTile {
  checkTileAddress(address);
  const { mapKey, classMapSha256 } = map;
  const { grid, proj4: crs } = requirePlace(run);
  const shown = run.classes.filter(({ code }) => !hiddenCodes.includes(code));
  const palette = shown.map(({ code, colour }): [number, [number, number, number, number]] => [
    code,
    [...readColour(colour), 255],
  ]);
  return {
    ...describeCaching(classMapSha256, named, [address, palette]),
    async draw(signal) {
      const band = await app.files.localPath(mapKey);
      const task = { ...address, crs, grid, layer: { kind: 'classes' as const, band, palette } };
      return (await app.workers.tiles.run(task, { signal })) ?? drawEmptyTile();
    },
  };
}

/** The class at a position; null outside the scene and where nothing is mapped. @throws NotFound without a map */
export async function probeClassMap(app: App, run: Run, lon: number, lat: number) {
  const { mapKey } = requireResult(run);
  const { grid, proj4: crs } = requirePlace(run);
  const path = await app.files.localPath(mapKey);
  const probe = await probePixel({ crs, grid, bands: [{ path, scale: 1, offset: 0 }], lon, lat }, app.bands);
  const code = probe?.values[0]?.dn ?? null;
  if (code === null || code === NODATA_CODE) return { code: null, name: null };
  return { code, name: run.classes.find((landClass) => landClass.code === code)?.name ?? null };
}
