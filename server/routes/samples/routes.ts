import type { Bounds } from '../../../shared/contracts/geometry.ts';
import {
  createSampleSchema,
  deleteSampleSchema,
  drawingMeasureSchema,
  measureDrawingSchema,
  restoreSampleSchema,
  sampleHistorySchema,
  sampleListQuerySchema,
  sampleListSchema,
  sampleSchema,
  updateSampleSchema,
} from '../../../shared/contracts/sample.ts';
import type { App } from '../../app-context.ts';
import type { Project } from '../../entities/project.ts';
import type { Sample } from '../../entities/sample.ts';
import { NotFound } from '../../errors.ts';
import { presentMeasure, presentSample, presentSampleVersion } from '../../presenters/present-sample.ts';
import { requireShown } from '../../services/block-independence.ts';
import { measureDrawing } from '../../services/drawing-measure.ts';
import { findProject } from '../../services/projects.ts';
import { listSamples } from '../../services/samples-list.ts';
import {
  createSample,
  deleteSample,
  findDrawingScene,
  findSample,
  listSampleVersions,
  restoreSample,
  updateSample,
} from '../../services/samples.ts';
import { findProjectTarget, projectParams } from '../find-project.ts';
import { route } from '../route.ts';
import { showCurrent } from '../show-current.ts';
import { findSampleTarget, sampleParams } from './find-sample.ts';

async function requireProject(app: App, id: string): Promise<Project> {
  const project = await findProject(app, id);
  if (!project) throw new NotFound();
  return project;
}

export const sampleRoutes = [
  route({
    id: 'samples.list',
    method: 'get',
    path: '/projects/:projectId/samples',
    summary: 'Samples of a project by number, all or those that meet a box',
    access: { kind: 'project', action: 'sample.read', find: findProjectTarget },
    params: projectParams,
    query: sampleListQuerySchema,
    answer: sampleListSchema,
    async handle({ app, params, query, viewer }) {
      const bounds = query.bbox ? (query.bbox.split(',').map(Number) as Bounds) : null;
      const samples = await listSamples(app, params.projectId, bounds, viewer.userId);
      return { samples: samples.map((sample) => presentSample(sample, viewer)) };
    },
  }),
  route({
    id: 'samples.create',
    method: 'post',
    path: '/projects/:projectId/samples',
    summary: 'Store a drawing as a sample; the same id again answers with the same sample',
    access: { kind: 'project', action: 'sample.draw', find: findProjectTarget },
    params: projectParams,
    body: createSampleSchema,
    answer: sampleSchema,
    status: 201,
    async handle({ app, viewer, body, target }) {
      return presentSample(await createSample(app, target.project, viewer.userId, body), viewer);
    },
  }),
  route({
    id: 'samples.measure',
    method: 'post',
    path: '/projects/:projectId/samples/measure',
    summary: 'Pixels, area and spectrum of a drawing, or why it would be refused; nothing is stored',
    access: { kind: 'project', action: 'sample.read', find: findProjectTarget },
    params: projectParams,
    body: measureDrawingSchema,
    answer: drawingMeasureSchema,
    async handle({ app, body, target: { project } }) {
      const scene = await findDrawingScene(app, project.id, body.sceneId);
      return presentMeasure(await measureDrawing(app, scene, project.studyArea, body.geometry));
    },
  }),
  route({
    id: 'samples.read',
    method: 'get',
    path: '/samples/:sampleId',
    summary: 'A sample',
    access: { kind: 'project', action: 'sample.read', find: findSampleTarget },
    params: sampleParams,
    answer: sampleSchema,
    async handle({ app, viewer, target: { sample } }) {
      await requireShown(app, sample, viewer.userId);
      if (sample.deletedAt) throw new NotFound('The sample was deleted.');
      return presentSample(sample, viewer);
    },
  }),
  route({
    id: 'samples.update',
    method: 'patch',
    path: '/samples/:sampleId',
    summary: 'Change class, outline, confidence or note',
    access: { kind: 'project', action: 'sample.edit', find: findSampleTarget },
    params: sampleParams,
    body: updateSampleSchema,
    answer: sampleSchema,
    handle: ({ app, viewer, body, target }) =>
      showCurrent(
        async () => {
          await requireShown(app, target.sample, viewer.userId);
          const project = await requireProject(app, target.projectId);
          return presentSample(await updateSample(app, project, target.sample, viewer.userId, body), viewer);
        },
        () => showSample(app, target.sample.id, (sample) => presentSample(sample, viewer)),
      ),
  }),
  route({
    id: 'samples.delete',
    method: 'delete',
    path: '/samples/:sampleId',
    summary: 'Take a sample off the map; its history can bring it back',
    access: { kind: 'project', action: 'sample.edit', find: findSampleTarget },
    params: sampleParams,
    body: deleteSampleSchema,
    answer: 'none',
    async handle({ app, viewer, body, target }) {
      await requireShown(app, target.sample, viewer.userId);
      await showCurrent(
        () => deleteSample(app, target.sample, viewer.userId, body.version),
        () => showSample(app, target.sample.id, (sample) => presentSample(sample, viewer)),
      );
      return undefined;
    },
  }),
  route({
    id: 'samples.restore',
    method: 'post',
    path: '/samples/:sampleId/restore',
    summary: 'Bring back an earlier version, or a deleted sample',
    access: { kind: 'project', action: 'sample.edit', find: findSampleTarget },
    params: sampleParams,
    body: restoreSampleSchema,
    answer: sampleSchema,
    async handle({ app, viewer, body, target }) {
      await requireShown(app, target.sample, viewer.userId);
      return presentSample(await restoreSample(app, target.sample.id, viewer.userId, body.versionNumber), viewer);
    },
  }),
  route({
    id: 'samples.history',
    method: 'get',
    path: '/samples/:sampleId/history',
    summary: 'Every version of a sample, latest first',
    access: { kind: 'project', action: 'sample.read', find: findSampleTarget },
    params: sampleParams,
    answer: sampleHistorySchema,
    async handle({ app, viewer, params, target }) {
      await requireShown(app, target.sample, viewer.userId);
      return { versions: (await listSampleVersions(app, params.sampleId)).map(presentSampleVersion) };
    },
  }),
];

async function showSample(app: App, id: string, present: (sample: Sample) => unknown): Promise<unknown> {
  const sample = await findSample(app, id);
  return sample ? present(sample) : undefined;
}
