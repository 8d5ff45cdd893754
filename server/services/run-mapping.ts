import { rm } from 'node:fs/promises';
import { join } from 'node:path';
import { UNCLASSIFIED_CODE } from '../../shared/constants/class-codes.ts';
import { runLayers, type RunLayer } from '../../shared/contracts/run.ts';
import { runComputeTask, runWatched } from '../jobs/compute/run-compute-task.ts';
import type { FinishedMap } from '../jobs/compute/tasks.ts';
import { forEachLimited } from '../jobs/for-each-limited.ts';
import { blockSize } from '../raster/band-file-format.ts';
import { writeClassMapFile } from '../raster/class-map-file.ts';
import { layerNodata } from '../raster/classify-strip.ts';
import { writeGeoTiffFromRaw } from '../raster/raw-to-geotiff.ts';
import { readColour } from './class-colour.ts';
import { measurePixelAreas } from './run-areas.ts';
import { runFiles } from './run-files.ts';
import { planShares } from './run-shares.ts';
import type { RunWork } from './run-work.ts';

/** Rows mapped at a time: one row of blocks, so that each block of a band is decoded once. */
const STRIP_ROWS = blockSize;
/** Colour of unclassified pixels in the class map's file. */
export const UNCLASSIFIED_COLOR: [number, number, number] = [128, 128, 128];

const LAYER_DESCRIPTION: Record<RunLayer, string> = {
  confidence: 'Share of the winning class, percent',
  margin: 'Share of the winning class less that of the runner-up, percent',
};

export interface MappedRun extends FinishedMap {
  notes: string[];
}

/**
 * Maps the scene in strips, several at a time, and joins them into the class map. Strips of an interrupted attempt are kept
 * and not mapped again; no more than a strip a thread is in memory.
 */
export async function mapRun(work: RunWork, trainingPixels: number): Promise<MappedRun> {
  const { run, scene } = work;
  const shares = planShares(
    run.recipe.classifier,
    trainingPixels,
    scene.bandPaths.length,
    run.classes.length,
    scene.grid.width * scene.grid.height,
  );
  const nStrips = await mapStrips(work, shares);
  return finishRunMap(work, nStrips, shares.finishing);
}

async function mapStrips(work: RunWork, shares: ReturnType<typeof planShares>): Promise<number> {
  const { app, run, scene, signal, report } = work;
  const files = runFiles(run.id);
  const nStrips = Math.ceil(scene.grid.height / STRIP_ROWS);
  const modelPath = await app.files.localPath(files.model);
  const codes = run.classes.map(({ code }) => code);
  const made = new Set(await app.files.list(files.strips));
  for (const layer of runLayers) for (const key of await app.files.list(files.layerStrips(layer))) made.add(key);
  const keysOf = (strip: number) => [files.strip(strip), ...runLayers.map((layer) => files.layerStrip(layer, strip))];
  const missing = Array.from({ length: nStrips }, (_, strip) => strip).filter((strip) =>
    keysOf(strip).some((key) => !made.has(key)),
  );
  let done = nStrips - missing.length;
  const say = () => {
    const share = shares.mapping + ((shares.finishing - shares.mapping) * done) / nStrips;
    report('Mapping strips', done, nStrips, share);
  };
  say();
  await forEachLimited(missing, app.workers.compute.threads, signal, async (strip, stripSignal) => {
    const y = strip * STRIP_ROWS;
    const height = Math.min(STRIP_ROWS, scene.grid.height - y);
    const mapped = await runComputeTask(
      app.workers.compute,
      'map-strip',
      { scene, modelPath, y, height, codes, minShare: run.recipe.minShare },
      stripSignal,
    );
    for (const layer of runLayers) await app.files.write(files.layerStrip(layer, strip), mapped[layer]);
    await app.files.write(files.strip(strip), mapped.codes);
    done++;
    say();
  });
  return nStrips;
}

async function finishRunMap(work: RunWork, nStrips: number, from: number): Promise<MappedRun> {
  const { app, run, scene, placed, heldOut, signal, report } = work;
  const files = runFiles(run.id);
  const areas = measurePixelAreas(placed);
  const stripPaths: string[] = [];
  for (let strip = 0; strip < nStrips; strip++) stripPaths.push(await app.files.localPath(files.strip(strip)));
  const scratch = await app.files.scratch('class-map');
  try {
    const rawPath = join(scratch.path, 'classes.raw');
    const map = await runWatched(
      nStrips,
      (done, total) => report('Counting classes', done, total, from + ((1 - from) / 2) * (done / total)),
      (progress) =>
        runComputeTask(
          app.workers.compute,
          'finish-map',
          { grid: scene.grid, stripPaths, rawPath, rowAreaM2: areas.rowAreaM2, heldOut, progress },
          signal,
        ),
    );
    const written = await writeClassMapFile(
      {
        stripPaths: [rawPath],
        grid: scene.grid,
        wkt: placed.wkt,
        classes: [
          ...(run.recipe.minShare > 0
            ? [{ code: UNCLASSIFIED_CODE, name: 'Unclassified', color: UNCLASSIFIED_COLOR }]
            : []),
          ...run.classes.map(({ code, name, colour }) => ({ code, name, color: readColour(colour) })),
        ],
        // Nothing of this one run: the same recipe and input give the same file.
        title: `Class map of ${run.scene.name}`,
        metadata: { CLASS_MAP_SHA256: map.sha256, INPUT_SHA256: run.inputSha256 },
      },
      join(scratch.path, 'class-map.tif'),
      {
        signal,
        onProgress: (done) => report('Writing the maps', done * 100, 300, from + ((1 - from) * (1 + done / 3)) / 2),
      },
    );
    for (const layer of runLayers) await writeLayer(work, nStrips, layer, scratch.path);
    await app.files.adopt(files.mapNames, written.auxPath);
    await app.files.adopt(files.map, written.path);
    return {
      ...map,
      notes: [areas.method, ...describeUnclassified(run.recipe.minShare, map), ...describeHeldOut(map)],
    };
  } finally {
    await scratch.dispose();
  }
}

/** Joins the strips of a layer into its GeoTIFF. */
async function writeLayer(
  { app, run, scene, placed, signal }: RunWork,
  nStrips: number,
  layer: RunLayer,
  folder: string,
) {
  const files = runFiles(run.id);
  const stripPaths: string[] = [];
  for (let strip = 0; strip < nStrips; strip++)
    stripPaths.push(await app.files.localPath(files.layerStrip(layer, strip)));
  const rawPath = join(folder, `${layer}.raw`);
  const outPath = join(folder, `${layer}.tif`);
  await runComputeTask(app.workers.compute, 'join-strips', { stripPaths, rawPath }, signal);
  await writeGeoTiffFromRaw(
    {
      ...{ rawPath, dtype: 'uint8', grid: scene.grid, wkt: placed.wkt, nodata: layerNodata },
      description: LAYER_DESCRIPTION[layer],
      metadata: {
        TIFFTAG_IMAGEDESCRIPTION: `${LAYER_DESCRIPTION[layer]}, ${run.scene.name}`,
        INPUT_SHA256: run.inputSha256,
      },
    },
    outPath,
    { overviews: 'average', signal },
  );
  await rm(rawPath);
  await app.files.adopt(files.layer(layer), outPath);
}

function describeUnclassified(minShare: number, { pixelsByCode }: FinishedMap): string[] {
  if (!(minShare > 0)) return [];
  const nPixels = pixelsByCode[UNCLASSIFIED_CODE] ?? 0;
  const percent = Number((minShare * 100).toFixed(1));
  return [`${nPixels} pixels are left unclassified: no class has a share of ${percent} % of the votes or more there.`];
}

function describeHeldOut({ nRepeated, nConflicting }: FinishedMap): string[] {
  const notes: string[] = [];
  if (nRepeated > 0) {
    notes.push(`${nRepeated} held-out pixels lie in several polygons of one class and count once.`);
  }
  if (nConflicting > 0) {
    notes.push(`${nConflicting} held-out pixels lie in polygons of different classes and count in no accuracy figure.`);
  }
  return notes;
}
