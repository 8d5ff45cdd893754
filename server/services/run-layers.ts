import { NODATA_CODE } from '../../shared/constants/class-codes.ts';
import type { RunLayer, RunVotes } from '../../shared/contracts/run.ts';
import { loadModel } from '../analysis/classifiers/registry.ts';
import { rasteriseMultiPolygon } from '../analysis/sampling/rasterise-polygon.ts';
import type { App } from '../app-context.ts';
import { Band } from '../entities/band.ts';
import type { Run } from '../entities/run.ts';
import { NotFound } from '../errors.ts';
import { probePixel } from '../raster/probe.ts';
import { readPixelFeatures } from '../raster/pixel-features.ts';
import { LAYER_RAMP } from '../../shared/constants/layer-ramp.ts';
import { In } from 'typeorm';
import { requireResult } from './accuracy.ts';
import { requirePlace } from './class-map-view.ts';
import { readColour } from './class-colour.ts';
import { openSceneInput } from './run-scene.ts';
import { checkTileAddress, describeCaching, drawEmptyTile, type PlannedTile, type TileAddress } from './tiles.ts';

/** Key of a layer in the file store. @throws NotFound where the run has none */
export function requireLayer(run: Run, layer: RunLayer): string {
  const key = requireResult(run).layerKeys?.[layer];
  if (key) return key;
  throw new NotFound();
}

/** Plans a tile of a layer in its ramp: pale where the map is unsure, deep where it is sure. @throws NotFound */
export function planLayerTile(app: App, run: Run, layer: RunLayer, address: TileAddress): PlannedTile {
  checkTileAddress(address);
  const key = requireLayer(run, layer);
  const { grid, proj4: crs } = requirePlace(run);
  const ramp = LAYER_RAMP.map((colour): [number, number, number, number] => [...readColour(colour), 255]);
  const { classMapSha256 } = requireResult(run);
  return {
    ...describeCaching(classMapSha256, classMapSha256, [layer, address, ramp]),
    async draw(signal) {
      const band = await app.files.localPath(key);
      const drawn = { kind: 'single' as const, band, stretch: [0, 100] as [number, number], ramp };
      const task = { ...address, crs, grid, layer: drawn, resampling: 'nearest' as const };
      return (await app.workers.tiles.run(task, { signal })) ?? drawEmptyTile();
    },
  };
}

/**
 * A window of a layer, row-major whole percent, `layerNodata` where nothing is mapped.
 * @throws NotFound where the run has no layers; RangeError when the window leaves the scene
 */
export async function readLayerWindow(
  app: App,
  run: Run,
  layer: RunLayer,
  window: { x: number; y: number; width: number; height: number },
): Promise<Uint8Array> {
  const band = await app.bands.open(await app.files.localPath(requireLayer(run, layer)));
  const { x, y, width, height } = window;
  return Uint8Array.from(await band.readWindow(0, x, y, width, height));
}

/** How the run's model votes on the pixel at a position. @throws NotFound without a map or outside the scene */
export async function readVotes(app: App, run: Run, lon: number, lat: number): Promise<RunVotes> {
  const { mapKey, modelKey } = requireResult(run);
  const placed = requirePlace(run);
  const { grid, proj4: crs } = placed;
  const mapPath = await app.files.localPath(mapKey);
  const probe = await probePixel({ crs, grid, bands: [{ path: mapPath, scale: 1, offset: 0 }], lon, lat }, app.bands);
  const { kind: classifier } = run.recipe.classifier;
  const kind = classifier === 'gaussian-maximum-likelihood' || classifier === 'minimum-distance' ? 'chances' : 'votes';
  const nothing: RunVotes = { code: null, kind, shares: [], confidence: null, margin: null };
  if (!probe) return nothing;
  const dn = probe.values[0]?.dn ?? null;
  const code = dn === null || dn === NODATA_CODE ? null : dn;
  const rows = await app.db.getRepository(Band).findBy({ id: In(run.recipe.bandIds), sceneId: run.sceneId });
  const bands = run.recipe.bandIds.flatMap((id) => rows.find((band) => band.id === id) ?? []);
  const scene = await openSceneInput(app, placed, bands, run.studyArea);
  const files = await Promise.all(scene.bandPaths.map((path) => app.bands.open(path)));
  const pixel = probe.row * grid.width + probe.col;
  if (scene.studyArea && !isInside(scene.studyArea, probe.row, probe.col)) return { ...nothing, code };
  const features = new Float32Array(files.length);
  const isUsable = await readPixelFeatures(grid, files, Uint32Array.of(pixel), { features });
  if (isUsable[0] === 0) return { ...nothing, code };
  const model = loadModel(new Uint8Array(await app.files.read(modelKey)));
  const shares = new Float32Array(model.nClasses);
  model.predictShares(features, 1, shares);
  const ranked = run.classes
    .map(({ id }, c) => ({ classId: id, share: shares[c] ?? 0 }))
    .sort((a, b) => b.share - a.share);
  const [first, second] = ranked;
  return {
    ...{ code, kind, shares: ranked, confidence: first?.share ?? null },
    margin: first ? first.share - (second?.share ?? 0) : null,
  };
}

function isInside(area: Parameters<typeof rasteriseMultiPolygon>[0], row: number, column: number): boolean {
  const shifted = area.map((polygon) => polygon.map((ring) => ring.map(([x, y]) => [x - column, y - row] as const)));
  return rasteriseMultiPolygon(shifted, 1, 1).length > 0;
}
