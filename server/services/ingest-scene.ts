import { join } from 'node:path';
import type { App } from '../app-context.ts';
import { Band } from '../entities/band.ts';
import { Scene, type SceneFailure } from '../entities/scene.ts';
import type { JobContext } from '../jobs/job-queue.ts';
import { ingestBands, type IngestedBand } from '../raster/ingest-bands.ts';
import { defaultSourceLimits, inspectSource } from '../raster/inspect-source.ts';
import type { RasterGrid } from '../raster/raster-grid.ts';
import { isSameGrid } from '../raster/raster-grid.ts';
import type { BandStatistics as RasterStatistics } from '../raster/band-statistics.ts';
import type { BandStatistics } from '../../shared/contracts/scene.ts';
import { SourceRefusal } from '../raster/source-refusal.ts';
import { fillBandSettings, measureGsdMeters } from './ingest-band-settings.ts';
import { CANCELLED, describeIngestFailure, IngestRefusal } from './ingest-failure.ts';
import { chooseSceneSource, gridOf, type IngestSource } from './ingest-sources.ts';

/** Shares of the whole job that are done when a step ends. */
const INSPECTED = 0.03;
const WRITTEN = 0.98;

/** A band as written, with what is known of the file it came from. */
interface WrittenBand extends IngestedBand {
  source: IngestSource;
  statistics: RasterStatistics;
}

/**
 * Turns the uploaded files of a scene into band files. Nothing is visible before the last step, which is one transaction, so the
 * work can be started again from the beginning at any time.
 * @throws Error with the failure in words; the scene then says the same
 */
export async function ingestScene(app: App, { job, signal, report }: JobContext): Promise<void> {
  const scene = await app.db.getRepository(Scene).findOneBy({ id: job.sceneId ?? '' });
  if (!scene || scene.state !== 'ingesting') return;
  const work = await app.files.scratch(`ingest-${scene.id}`);
  try {
    report('Reading what the files are', 0, scene.files.length, 0);
    const sources = await inspectFiles(app, scene, signal);
    const finest = chooseSceneSource(sources);
    const bands = await writeBands(app, sources, work.path, { signal, report });
    report('Storing the bands', bands.length, bands.length, WRITTEN);
    await storeScene(app, scene, finest, bands, work.path);
  } catch (error) {
    if (signal.aborted && signal.reason === 'shutdown') throw error;
    const failure = signal.aborted ? CANCELLED : describeIngestFailure(error);
    await failScene(app, scene.id, failure);
    throw new Error(`Found ${failure.found}; wanted ${failure.wanted}. ${failure.advice}`, { cause: error });
  } finally {
    await work.dispose();
  }
}

/** Marks a scene that is being ingested as failed and lets go of its files; one that is ready meanwhile stays so. */
export async function failScene(app: App, sceneId: string, failure: SceneFailure): Promise<void> {
  const scenes = app.db.getRepository(Scene);
  const scene = await scenes.findOneBy({ id: sceneId, state: 'ingesting' });
  if (scene) {
    const files = scene.files.map((file) => ({ ...file, key: null }));
    const result = await scenes.update({ id: sceneId, state: 'ingesting' }, { state: 'failed', failure, files });
    if (result.affected) {
      await app.events.publish(scene.projectId, { type: 'changed', what: 'scenes', id: sceneId, by: null });
    }
  }
  await app.files.remove(`incoming/${sceneId}/`);
  const isReady = await scenes.existsBy({ id: sceneId, state: 'ready' });
  if (!isReady) await app.files.remove(`scenes/${sceneId}/`);
}

async function inspectFiles(app: App, scene: Scene, signal: AbortSignal): Promise<IngestSource[]> {
  const sources: IngestSource[] = [];
  for (const { name, key } of scene.files) {
    if (key === null) throw new Error(`scene ${scene.id} has lost its upload`);
    const path = await app.files.localPath(key);
    const limits = { ...defaultSourceLimits, maxPixels: app.config.maxScenePixels };
    const info = await nameFile(scene.files.length, name, () => inspectSource(path, { limits, signal }));
    sources.push({ name, path, info });
  }
  return sources;
}

/** Says which of several files a refusal is about. */
async function nameFile<T>(nFiles: number, name: string, work: () => Promise<T>): Promise<T> {
  try {
    return await work();
  } catch (error) {
    if (!(error instanceof SourceRefusal) || nFiles === 1) throw error;
    throw new SourceRefusal(error.code, `${name}: ${error.found}`, error.wanted, error.advice);
  }
}

async function writeBands(
  app: App,
  sources: readonly IngestSource[],
  outDir: string,
  { signal, report }: Pick<JobContext, 'signal' | 'report'>,
): Promise<WrittenBand[]> {
  const nBands = sources.reduce((sum, { info }) => sum + info.bands.length, 0);
  const weights = sources.map(({ info }) => info.width * info.height * info.bands.length);
  const totalWeight = weights.reduce((sum, weight) => sum + weight, 0);
  const written: WrittenBand[] = [];
  let doneWeight = 0;
  for (const [place, source] of sources.entries()) {
    const firstFileNumber = written.length + 1;
    const weight = weights[place] ?? 0;
    const ingested = await nameFile(sources.length, source.name, () =>
      ingestBands(source.path, source.info, outDir, {
        firstFileNumber,
        signal,
        timeoutMs: app.config.ingest.timeoutSeconds * 1000,
        memoryBytes: app.config.ingest.memoryMb * 1024 ** 2,
        onProgress: (fraction) => {
          const nDone = written.length + Math.floor(fraction * source.info.bands.length);
          const share = INSPECTED + (WRITTEN - INSPECTED) * ((doneWeight + fraction * weight) / totalWeight);
          report('Writing and measuring bands', nDone, nBands, share);
        },
      }),
    );
    for (const band of ingested) written.push({ ...band, source, statistics: requireData(band, source) });
    doneWeight += weight;
  }
  return written;
}

/** A band without a single value would leave no pixel of the scene with data in all bands. */
function requireData(band: IngestedBand, source: IngestSource): RasterStatistics {
  if (band.statistics) return band.statistics;
  throw new IngestRefusal({
    code: 'empty-band',
    found: `no pixel with data in band ${band.sourceIndex}${band.description ? ` (${band.description})` : ''} of ${source.name}`,
    wanted: 'data in every band',
    advice: 'Leave this band out with gdal_translate -b, or correct the nodata value with gdal_translate -a_nodata.',
  });
}

function presentStatistics(statistics: RasterStatistics, grid: RasterGrid): BandStatistics {
  const { nValid, min, max, mean, sd, p2, p98, histogram } = statistics;
  const nodataPixels = grid.width * grid.height - nValid;
  return { validPixels: nValid, nodataPixels, min, max, mean, standardDeviation: sd, p2, p98, histogram };
}

async function storeScene(
  app: App,
  scene: Scene,
  finest: IngestSource,
  written: readonly WrittenBand[],
  workDir: string,
): Promise<void> {
  const sceneGrid = gridOf(finest.info);
  const described = written.map((band) => {
    const { info, name } = band.source;
    const fileStem = info.bands.length === 1 ? name.replace(/\.[^.]*$/, '') : null;
    const colorInterp = info.bands.find(({ index }) => index === band.sourceIndex)?.colorInterp ?? '';
    const { p2, p98 } = band.statistics;
    return { ...band, fileStem, colorInterp, p2, p98, isOnSceneGrid: isSameGrid(sceneGrid, gridOf(info)) };
  });
  const { settings, guessedRoles } = fillBandSettings(described);
  const rows = written.map((band, i): Partial<Band> => {
    const grid = gridOf(band.source.info);
    return {
      ...settings[i],
      ...grid,
      sceneId: scene.id,
      number: i + 1,
      gsdMeters: measureGsdMeters(band.source.info, grid),
      scale: band.scale,
      offset: band.offset,
      nodata: band.nodata === null || Number.isNaN(band.nodata) ? null : band.nodata,
      dataType: band.dtype,
      statistics: presentStatistics(band.statistics, grid),
      sha256: band.sha256,
      fileKey: `scenes/${scene.id}/${band.fileName}`,
    };
  });
  for (const { fileName } of written) await app.files.adopt(`scenes/${scene.id}/${fileName}`, join(workDir, fileName));
  const isStored = await app.db.transaction(async (manager) => {
    const { crs, bounds, footprint } = finest.info;
    const result = await manager.update(
      Scene,
      { id: scene.id, state: 'ingesting' },
      {
        state: 'ready',
        files: scene.files.map((file) => ({ ...file, key: null })),
        ...sceneGrid,
        crsName: crs.name.slice(0, 200),
        crsEpsg: crs.epsg,
        crsProj4: crs.proj4,
        crsWkt: crs.wkt,
        bounds: [bounds.west, bounds.south, bounds.east, bounds.north],
        footprint,
        guessedRoles,
      },
    );
    if (result.affected) await manager.insert(Band, rows as never);
    return Boolean(result.affected);
  });
  await app.files.remove(`incoming/${scene.id}/`);
  if (isStored) await app.events.publish(scene.projectId, { type: 'changed', what: 'scenes', id: scene.id, by: null });
  // Deleted or cancelled in the meantime: the band files belong to nothing.
  else await app.files.remove(`scenes/${scene.id}/`);
}
