import { IsNull, type EntityManager } from 'typeorm';
import type { z } from 'zod';
import type { Polygon } from '../../shared/contracts/geometry.ts';
import type { Confidence, createSampleSchema, updateSampleSchema } from '../../shared/contracts/sample.ts';
import type { App } from '../app-context.ts';
import { LandClass } from '../entities/land-class.ts';
import { Project } from '../entities/project.ts';
import { SampleVersion } from '../entities/sample-version.ts';
import { Sample } from '../entities/sample.ts';
import type { Scene } from '../entities/scene.ts';
import { Conflict, InvalidInput, NotFound } from '../errors.ts';
import { requireDrawing } from './drawing-measure.ts';
import { placeSamples } from './place-samples.ts';
import { recordSampleActivity } from './sample-activity.ts';
import { resubmitAccepted } from './sample-review.ts';
import { findScene } from './scenes.ts';

/** A sample, deleted or not, with its maker. */
export function findSample(app: App, id: string): Promise<Sample | null> {
  return app.db.getRepository(Sample).findOne({ where: { id }, relations: { createdBy: true } });
}

async function loadSample(app: App, id: string): Promise<Sample> {
  const sample = await findSample(app, id);
  if (!sample) throw new NotFound();
  return sample;
}

/** The scene to draw on, with its bands. @throws InvalidInput unless it is the project's and ready */
export async function findDrawingScene(app: App, projectId: string, sceneId: string): Promise<Scene> {
  const scene = await findScene(app, sceneId);
  const isOwn = scene?.projectId === projectId;
  if (scene && isOwn && scene.state === 'ready') return scene;
  const message = isOwn ? 'The scene is not ready.' : 'Choose a scene of this project.';
  throw new InvalidInput('The sample cannot be drawn on this scene.', { errors: [{ path: 'sceneId', message }] });
}

function refuseClass(): InvalidInput {
  return new InvalidInput('The sample needs a class of this project.', {
    errors: [{ path: 'classId', message: 'Choose a class of this project.' }],
  });
}

/** Keeps scene and class in place until the transaction ends. */
async function holdScheme(manager: EntityManager, projectId: string, classId: string): Promise<void> {
  const landClass = await manager.findOne(LandClass, {
    where: { id: classId, projectId },
    lock: { mode: 'pessimistic_read' },
  });
  if (!landClass) throw refuseClass();
}

interface SampleContent {
  classId: string;
  geometry: Polygon;
  confidence: Confidence;
  note: string;
  pixelCount: number;
  areaHa: number;
}

async function recordVersion(
  manager: EntityManager,
  sampleId: string,
  versionNumber: number,
  change: SampleVersion['change'],
  { classId, geometry, confidence, note, pixelCount, areaHa }: SampleContent,
  byId: string,
): Promise<void> {
  const content = { classId, geometry, confidence, note, pixelCount, areaHa };
  await manager.insert(SampleVersion, { sampleId, versionNumber, change, byId, ...content });
}

async function announce(app: App, { projectId, id }: Pick<Sample, 'projectId' | 'id'>, byId: string): Promise<void> {
  await app.events.publish(projectId, { type: 'changed', what: 'samples', id, by: byId });
}

/** The sample that was stored under the client's id by an earlier try, whose answer was lost. */
async function findEarlierTry(app: App, projectId: string, byId: string, id: string): Promise<Sample | null> {
  const sample = await findSample(app, id);
  if (!sample) return null;
  if (sample.projectId === projectId && sample.createdById === byId && sample.deletedAt === null) return sample;
  throw new Conflict(
    'This identifier was used before.',
    { wanted: 'a new identifier for each sample', advice: 'Draw the sample again.' },
    'id-taken',
  );
}

/** Stores a drawing. Sent again with the same id, it answers with the sample stored before. */
export async function createSample(
  app: App,
  project: Project,
  byId: string,
  input: z.output<typeof createSampleSchema>,
): Promise<Sample> {
  const earlier = await findEarlierTry(app, project.id, byId, input.id);
  if (earlier) return earlier;
  const scene = await findDrawingScene(app, project.id, input.sceneId);
  if (!(await app.db.getRepository(LandClass).existsBy({ id: input.classId, projectId: project.id }))) {
    throw refuseClass();
  }
  const measure = await requireDrawing(app, scene, project.studyArea, input.geometry);
  try {
    await app.db.transaction(async (manager) => {
      // Raising the number first locks the project's row: numbers come in the order of the commits, none twice.
      await manager.increment(Project, { id: project.id }, 'lastSampleNumber', 1);
      const { lastSampleNumber } = await manager.findOneOrFail(Project, {
        where: { id: project.id },
        select: { id: true, lastSampleNumber: true },
        lock: { mode: 'pessimistic_write' },
      });
      await holdScheme(manager, project.id, input.classId);
      const content = { ...input, ...measure };
      await manager.insert(Sample, {
        ...content,
        projectId: project.id,
        number: lastSampleNumber,
        createdById: byId,
        updatedAt: new Date(),
        deletedAt: null,
      });
      await placeSamples(manager, project.id, input.id);
      await recordVersion(manager, input.id, 1, 'created', content, byId);
      await recordSampleActivity(manager, project.id, byId, 'drew', lastSampleNumber);
    });
  } catch (error) {
    if ((error as { code?: string }).code !== 'ER_DUP_ENTRY') throw error;
    // The same sample came twice at once and the other was quicker.
    const other = await findEarlierTry(app, project.id, byId, input.id);
    if (!other) throw error;
    return other;
  }
  await announce(app, { projectId: project.id, id: input.id }, byId);
  return loadSample(app, input.id);
}

function refuseStale(): Conflict {
  return new Conflict(
    'Someone else changed the sample in between.',
    { advice: 'Look at both versions and choose.' },
    'stale-version',
  );
}

function refuseDeleted(): Conflict {
  return new Conflict(
    'The sample was deleted in between.',
    { advice: 'Restore it from its history to go on with it.' },
    'deleted',
  );
}

/** Changes a sample if it still stands at `version`. @throws Conflict when someone changed or deleted it in between */
export async function updateSample(
  app: App,
  project: Project,
  sample: Sample,
  byId: string,
  { version, ...change }: z.output<typeof updateSampleSchema>,
): Promise<Sample> {
  if (sample.deletedAt) throw refuseDeleted();
  if (sample.version !== version) throw refuseStale();
  const scene = change.geometry ? await findDrawingScene(app, project.id, sample.sceneId) : null;
  const measure =
    scene && change.geometry ? await requireDrawing(app, scene, project.studyArea, change.geometry) : null;
  await app.db.transaction(async (manager) => {
    if (change.classId) await holdScheme(manager, project.id, change.classId);
    const content = { ...sample, ...change, ...measure };
    const { classId, geometry, confidence, note, pixelCount, areaHa } = content;
    const result = await manager.update(
      Sample,
      { id: sample.id, version, deletedAt: IsNull() },
      { classId, geometry, confidence, note, pixelCount, areaHa, version: version + 1, updatedAt: new Date() },
    );
    if (result.affected === 0) throw refuseStale();
    if (change.geometry) await placeSamples(manager, project.id, sample.id);
    await resubmitAccepted(manager, sample.id, byId);
    await recordVersion(manager, sample.id, version + 1, 'edited', content, byId);
    await recordSampleActivity(manager, project.id, byId, 'changed', sample.number);
  });
  await announce(app, sample, byId);
  return loadSample(app, sample.id);
}

/** Takes a sample off the map; its history stays and can bring it back. Deleting twice is no error. */
export async function deleteSample(app: App, sample: Sample, byId: string, version: number): Promise<void> {
  if (sample.deletedAt) return;
  await app.db.transaction(async (manager) => {
    const now = new Date();
    const result = await manager.update(
      Sample,
      { id: sample.id, version, deletedAt: IsNull() },
      { deletedAt: now, updatedAt: now, version: version + 1 },
    );
    if (result.affected === 0) throw refuseStale();
    await recordVersion(manager, sample.id, version + 1, 'deleted', sample, byId);
    await recordSampleActivity(manager, sample.projectId, byId, 'deleted', sample.number);
  });
  await announce(app, sample, byId);
}

/**
 * Brings back a version of a sample, as a new version; a deleted sample returns to the map. Where the class of that version is
 * gone, the sample keeps the class it has now.
 */
export async function restoreSample(app: App, id: string, byId: string, versionNumber: number): Promise<Sample> {
  const sample = await app.db.transaction(async (manager) => {
    const now = await manager.findOneOrFail(Sample, { where: { id }, lock: { mode: 'pessimistic_write' } });
    const wanted = await manager.findOneBy(SampleVersion, { sampleId: id, versionNumber });
    if (!wanted) {
      throw new InvalidInput('The sample has no such version.', {
        found: `version ${versionNumber}`,
        wanted: `a version from 1 to ${now.version}`,
        errors: [{ path: 'versionNumber', message: `There is no version ${versionNumber}.` }],
      });
    }
    const hasClass = await manager.existsBy(LandClass, { id: wanted.classId, projectId: now.projectId });
    const { geometry, confidence, note, pixelCount, areaHa } = wanted;
    const classId = hasClass ? wanted.classId : now.classId;
    const content = { classId, geometry, confidence, note, pixelCount, areaHa };
    const version = now.version + 1;
    await manager.update(Sample, { id }, { ...content, version, updatedAt: new Date(), deletedAt: null });
    await placeSamples(manager, now.projectId, id);
    if (!hasSameContent(now, content)) await resubmitAccepted(manager, id, byId);
    await recordVersion(manager, id, version, 'restored', content, byId);
    await recordSampleActivity(manager, now.projectId, byId, 'restored', now.number);
    return now;
  });
  await announce(app, sample, byId);
  return loadSample(app, id);
}

/** Whether bringing back a version leaves the sample as it is, as undoing a deletion does. */
function hasSameContent(now: Sample, content: SampleContent): boolean {
  const { classId, geometry, confidence, note } = content;
  return (
    now.classId === classId &&
    now.confidence === confidence &&
    now.note === note &&
    JSON.stringify(now.geometry) === JSON.stringify(geometry)
  );
}

/** Every version of a sample, latest first. */
export function listSampleVersions(app: App, sampleId: string): Promise<SampleVersion[]> {
  return app.db
    .getRepository(SampleVersion)
    .find({ where: { sampleId }, relations: { by: true }, order: { versionNumber: 'DESC' } });
}
