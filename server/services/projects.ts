import { bbox } from '@turf/turf';
import { In, IsNull, type EntityManager, type QueryDeepPartialEntity } from 'typeorm';
import type { ArealGeometry, Bounds } from '../../shared/contracts/geometry.ts';
import type { App } from '../app-context.ts';
import { Job } from '../entities/job.ts';
import { LandClass } from '../entities/land-class.ts';
import { Membership } from '../entities/membership.ts';
import { Project } from '../entities/project.ts';
import { Run } from '../entities/run.ts';
import { Sample } from '../entities/sample.ts';
import { Scene } from '../entities/scene.ts';
import { Conflict, InvalidInput, NotFound } from '../errors.ts';
import { recordActivity } from './activities.ts';

export async function findProject(app: App, id: string): Promise<Project | null> {
  return app.db.getRepository(Project).findOneBy({ id });
}

/** Projects the person is a member of, last changed first. */
export async function listMyMemberships(app: App, userId: string): Promise<Membership[]> {
  const memberships = await app.db.getRepository(Membership).find({ where: { userId }, relations: { project: true } });
  return memberships.sort((a, b) => b.project.updatedAt.getTime() - a.project.updatedAt.getTime());
}

export async function createProject(
  app: App,
  byId: string,
  input: { name: string; client: string; description: string },
): Promise<Project> {
  return app.db.transaction(async (manager) => {
    const project = await manager.save(
      Project,
      manager.create(Project, { ...input, studyArea: null, targetOverallAccuracy: null, targetSamplesPerClass: null }),
    );
    await manager.insert(Membership, { projectId: project.id, userId: byId, roles: ['lead'] });
    await recordActivity(manager, project.id, byId, 'created the project', 'overview');
    return manager.findOneByOrFail(Project, { id: project.id });
  });
}

/** Changes a project if it still stands at `version`. @throws Conflict when someone changed it in between */
export async function updateProject(
  app: App,
  id: string,
  byId: string,
  version: number,
  change: QueryDeepPartialEntity<Project>,
  said: string,
): Promise<Project> {
  await app.db.transaction(async (manager) => {
    const result = await manager.update(Project, { id, version }, { ...change, version: version + 1 });
    if (result.affected === 0) {
      throw new Conflict(
        'Someone else changed the project in between.',
        { advice: 'Look at their change, then make yours again.' },
        'stale-version',
      );
    }
    await recordActivity(manager, id, byId, said, 'overview');
  });
  await app.events.publish(id, { type: 'changed', what: 'project', id, by: byId });
  return app.db.getRepository(Project).findOneByOrFail({ id });
}

export function setStudyArea(
  app: App,
  id: string,
  byId: string,
  version: number,
  studyArea: ArealGeometry | null,
): Promise<Project> {
  return updateProject(
    app,
    id,
    byId,
    version,
    { studyArea },
    studyArea ? 'set the study area' : 'removed the study area',
  );
}

/** Removes a project with all that belongs to it, files included. @throws InvalidInput unless its name is typed again */
export async function deleteProject(app: App, id: string, confirmName: string): Promise<void> {
  const project = await app.db.getRepository(Project).findOneBy({ id });
  if (!project) throw new NotFound();
  if (confirmName.trim() !== project.name) {
    throw new InvalidInput('The name typed is not the project’s.', {
      wanted: project.name,
      errors: [{ path: 'confirmName', message: 'Type the project’s name exactly.' }],
    });
  }
  await deleteProjectWhole(app, id);
}

/** Removes a project, stops its jobs and removes its files. */
export async function deleteProjectWhole(app: App, id: string): Promise<void> {
  const jobs = await app.db.getRepository(Job).findBy({ projectId: id, state: In(['queued', 'running']) });
  for (const job of jobs) await app.jobs.cancel(job.id);
  const { sceneIds, runIds } = await app.db.transaction((manager) => deleteRows(manager, id));
  for (const sceneId of sceneIds) {
    await app.files.remove(`scenes/${sceneId}/`);
    await app.files.remove(`incoming/${sceneId}/`);
  }
  for (const runId of runIds) await app.files.remove(`runs/${runId}/`);
}

async function deleteRows(manager: EntityManager, projectId: string) {
  const runIds = (await manager.find(Run, { where: { projectId }, select: { id: true } })).map(({ id }) => id);
  const sceneIds = (await manager.find(Scene, { where: { projectId }, select: { id: true } })).map(({ id }) => id);
  await manager.delete(Run, { projectId });
  await manager.delete(Job, { projectId });
  await manager.delete(Sample, { projectId });
  await manager.delete(LandClass, { projectId });
  await manager.delete(Scene, { projectId });
  await manager.delete(Project, { id: projectId });
  return { sceneIds, runIds };
}

export interface ProjectCounts {
  scenesReady: number;
  scenes: number;
  classes: number;
  samples: number;
  classesWithSamples: number;
  runs: number;
  runsFinished: number;
}

export async function countProject(app: App, projectId: string): Promise<ProjectCounts> {
  const scenes = await app.db.getRepository(Scene).find({ where: { projectId }, select: { id: true, state: true } });
  const runs = await app.db
    .getRepository(Run)
    .find({ where: { projectId }, relations: { job: true }, select: { id: true, job: { id: true, state: true } } });
  const perClass = await app.db
    .getRepository(Sample)
    .createQueryBuilder('sample')
    .select('sample.classId', 'classId')
    .addSelect('COUNT(*)', 'count')
    .where({ projectId, deletedAt: IsNull() })
    .groupBy('sample.classId')
    .getRawMany<{ classId: string; count: string }>();
  return {
    scenes: scenes.length,
    scenesReady: scenes.filter((scene) => scene.state === 'ready').length,
    classes: await app.db.getRepository(LandClass).countBy({ projectId }),
    samples: perClass.reduce((sum, row) => sum + Number(row.count), 0),
    classesWithSamples: perClass.length,
    runs: runs.length,
    runsFinished: runs.filter((run) => run.job.state === 'finished').length,
  };
}

/** West, south, east, north of a geometry in degrees. */
export function boundsOf(geometry: ArealGeometry): Bounds {
  const [west, south, east, north] = bbox(geometry);
  return [west, south, east, north];
}
