import { createHash } from 'node:crypto';
import { In, IsNull, Not, type EntityManager } from 'typeorm';
import type { UpdateScene } from '../../shared/contracts/scene.ts';
import type { App } from '../app-context.ts';
import { Band } from '../entities/band.ts';
import { Job } from '../entities/job.ts';
import { Run } from '../entities/run.ts';
import { Sample } from '../entities/sample.ts';
import { Scene } from '../entities/scene.ts';
import { Conflict, InvalidInput, NotFound } from '../errors.ts';
import type { RasterGrid } from '../raster/raster-grid.ts';
import { recordActivity } from './activities.ts';
import { describeGivenUp, CANCELLED } from './ingest-failure.ts';
import { failScene } from './ingest-scene.ts';

/** A scene with its bands in order, and the job that ingests or ingested it. */
export interface SceneRow {
  scene: Scene;
  job: Job | null;
}

const SHOWN = { bands: true, uploadedBy: true } as const;

/** Sorted here: MariaDB would sort bands with their statistics in a temporary table on disk. */
function sortBands(scene: Scene): Scene {
  scene.bands.sort((a, b) => a.number - b.number);
  return scene;
}

export async function findScene(app: App, id: string): Promise<Scene | null> {
  const scene = await app.db.getRepository(Scene).findOne({ where: { id }, relations: SHOWN });
  return scene && sortBands(scene);
}

export async function loadSceneRow(app: App, id: string): Promise<SceneRow> {
  const scene = await findScene(app, id);
  if (!scene) throw new NotFound();
  const [row] = await addJobs(app, [scene]);
  return row as SceneRow;
}

/** The project's scenes, latest first. */
export async function listScenes(app: App, projectId: string): Promise<SceneRow[]> {
  const scenes = await app.db.getRepository(Scene).find({
    where: { projectId },
    relations: SHOWN,
    order: { createdAt: 'DESC' },
  });
  return addJobs(app, scenes.map(sortBands));
}

async function addJobs(app: App, scenes: readonly Scene[]): Promise<SceneRow[]> {
  const sceneIds = scenes.map(({ id }) => id);
  const projectIds = [...new Set(scenes.map(({ projectId }) => projectId))];
  const jobs = scenes.length
    ? await app.db
        .getRepository(Job)
        .find({ where: { projectId: In(projectIds), kind: 'ingest', sceneId: In(sceneIds) } })
    : [];
  return scenes.map((scene) => {
    const job = jobs.find(({ sceneId }) => sceneId === scene.id) ?? null;
    return { scene: settle(scene, job), job };
  });
}

/** A job given up because its server kept stopping has no one left to say so in the scene's row. */
function settle(scene: Scene, job: Job | null): Scene {
  if (scene.state !== 'ingesting' || job?.state !== 'failed') return scene;
  return Object.assign(scene, { state: 'failed' as const, failure: describeGivenUp(job.error) });
}

/** Changes a scene if it still stands at `version`. @throws Conflict when someone changed it in between */
export async function updateScene(
  app: App,
  scene: Scene,
  byId: string,
  { version, bands, ...change }: UpdateScene,
): Promise<SceneRow> {
  if (bands) checkBands(scene, bands);
  await app.db.transaction(async (manager) => {
    const result = await manager.update(
      Scene,
      { id: scene.id, version },
      { ...change, ...(bands ? { guessedRoles: false } : {}), version: version + 1 },
    );
    if (result.affected === 0) {
      throw new Conflict(
        'Someone else changed the scene in between.',
        { advice: 'Look at their change, then make yours again.' },
        'stale-version',
      );
    }
    for (const { id, ...settings } of bands ?? []) await manager.update(Band, { id, sceneId: scene.id }, settings);
    const said = bands ? 'changed the band table of' : 'changed';
    await recordActivity(
      manager,
      scene.projectId,
      byId,
      `${said} scene ${change.name ?? scene.name}`,
      `scenes/${scene.id}`,
    );
  });
  await app.events.publish(scene.projectId, { type: 'changed', what: 'scenes', id: scene.id, by: byId });
  return loadSceneRow(app, scene.id);
}

function checkBands(scene: Scene, bands: NonNullable<UpdateScene['bands']>): void {
  const own = new Set(scene.bands.map(({ id }) => id));
  const seen = new Set<string>();
  const errors = bands.flatMap(({ id }, place) => {
    const problem = !own.has(id)
      ? 'This is no band of the scene.'
      : seen.has(id)
        ? 'This band stands here twice.'
        : null;
    seen.add(id);
    return problem ? [{ path: `bands.${place}.id`, message: problem }] : [];
  });
  if (errors.length) throw new InvalidInput('The band table does not fit the scene.', { errors });
}

/** Stops an ingest under way; an ended one stays as it is. */
export async function cancelIngest(app: App, scene: Scene): Promise<SceneRow> {
  const { job } = await loadSceneRow(app, scene.id);
  if (scene.state === 'ingesting' && job) {
    await app.jobs.cancel(job.id);
    await failScene(app, scene.id, CANCELLED);
  }
  return loadSceneRow(app, scene.id);
}

/** Deletes a scene and its files; samples already deleted go with it. @throws Conflict while samples or runs need it */
export async function deleteScene(app: App, scene: Scene, byId: string): Promise<void> {
  const { job } = await loadSceneRow(app, scene.id);
  if (job) await app.jobs.cancel(job.id);
  await app.db.transaction(async (manager) => {
    await manager.findOne(Scene, { where: { id: scene.id }, lock: { mode: 'pessimistic_write' } });
    await checkUnused(manager, scene);
    await manager.delete(Sample, { sceneId: scene.id, deletedAt: Not(IsNull()) });
    await manager.delete(Job, { sceneId: scene.id, kind: 'ingest' });
    await manager.delete(Scene, { id: scene.id });
    await recordActivity(manager, scene.projectId, byId, `deleted scene ${scene.name}`, 'scenes');
  });
  for (const { fileKey } of scene.bands) {
    if (await app.files.has(fileKey)) await app.bands.forget(await app.files.localPath(fileKey));
  }
  await app.files.remove(`scenes/${scene.id}/`);
  await app.files.remove(`incoming/${scene.id}/`);
  await app.events.publish(scene.projectId, { type: 'changed', what: 'scenes', id: scene.id, by: byId });
}

async function checkUnused(manager: EntityManager, scene: Scene): Promise<void> {
  const nSamples = await manager.countBy(Sample, { sceneId: scene.id, deletedAt: IsNull() });
  const nRuns = await manager.countBy(Run, { sceneId: scene.id });
  if (nSamples + nRuns === 0) return;
  const users = [
    ...(nSamples ? [nSamples === 1 ? '1 sample' : `${nSamples} samples`] : []),
    ...(nRuns ? [nRuns === 1 ? '1 run' : `${nRuns} runs`] : []),
  ].join(' and ');
  throw new Conflict(
    'The scene is in use.',
    { found: `${users} on this scene`, wanted: 'a scene that nothing uses', advice: 'Delete those first.' },
    'in-use',
  );
}

/** The grid of a scene that is ready. @throws Conflict while it is not */
export function requireGrid(scene: Scene): { grid: RasterGrid; crs: string } {
  const { state, width, height, originX, originY, pixelWidth, pixelHeight, crsProj4 } = scene;
  if (
    state !== 'ready' ||
    width === null ||
    height === null ||
    originX === null ||
    originY === null ||
    pixelWidth === null ||
    pixelHeight === null ||
    crsProj4 === null
  ) {
    throw new Conflict(
      'The scene is not ready.',
      { found: state === 'failed' ? 'a failed ingest' : 'an ingest under way', wanted: 'a scene that is ready' },
      'not-ready',
    );
  }
  return { grid: { width, height, originX, originY, pixelWidth, pixelHeight }, crs: crsProj4 };
}

/** Digest of what a tile can depend on: band files, and the settings that choose bands and quantities. */
export function computeContentKey(bands: readonly Band[]): string {
  const parts = bands.map(({ number, role, scale, offset, quantity, nodata, sha256 }) => [
    number,
    role,
    scale,
    offset,
    quantity,
    nodata,
    sha256,
  ]);
  return createHash('sha256').update(JSON.stringify(parts)).digest('hex').slice(0, 20);
}
