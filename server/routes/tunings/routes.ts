import { z } from 'zod';
import { idSchema } from '../../../shared/contracts/common.ts';
import { startTuningSchema, tuningListSchema, tuningSchema } from '../../../shared/contracts/tuning.ts';
import type { App } from '../../app-context.ts';
import type { Tuning } from '../../entities/tuning.ts';
import { presentTuning } from '../../presenters/present-recipe.ts';
import { deleteTuning, findTuning, listTunings, startTuning } from '../../services/tunings.ts';
import { findProjectTarget, projectParams } from '../find-project.ts';
import { route } from '../route.ts';

const tuningParams = z.object({ tuningId: idSchema });

async function findTuningTarget(
  app: App,
  params: { tuningId: string },
): Promise<{ projectId: string; tuning: Tuning } | null> {
  const tuning = await findTuning(app, params.tuningId);
  return tuning ? { projectId: tuning.projectId, tuning } : null;
}

export const tuningRoutes = [
  route({
    id: 'tunings.list',
    method: 'get',
    path: '/projects/:projectId/tunings',
    summary: 'Searches for the settings of a classifier, newest first',
    access: { kind: 'project', action: 'run.start', find: findProjectTarget },
    params: projectParams,
    answer: tuningListSchema,
    handle: async ({ app, viewer, params }) => ({
      tunings: (await listTunings(app, params.projectId)).map((row) => presentTuning(row, viewer)),
    }),
  }),
  route({
    id: 'tunings.start',
    method: 'post',
    path: '/projects/:projectId/tunings',
    summary: 'Try settings of a classifier by spatial cross-validation on the training samples',
    access: { kind: 'project', action: 'run.start', find: findProjectTarget },
    params: projectParams,
    body: startTuningSchema,
    answer: tuningSchema,
    status: 201,
    handle: async ({ app, viewer, target, body }) =>
      presentTuning(await startTuning(app, target.project, viewer.userId, body), viewer),
  }),
  route({
    id: 'tunings.read',
    method: 'get',
    path: '/tunings/:tuningId',
    summary: 'A search: progress and what came of its trials',
    access: { kind: 'project', action: 'run.start', find: findTuningTarget },
    params: tuningParams,
    answer: tuningSchema,
    handle: ({ viewer, target }) => Promise.resolve(presentTuning(target.tuning, viewer)),
  }),
  route({
    id: 'tunings.delete',
    method: 'delete',
    path: '/tunings/:tuningId',
    summary: 'Delete an ended search',
    access: { kind: 'project', action: 'run.stop', find: findTuningTarget },
    params: tuningParams,
    answer: 'none',
    async handle({ app, viewer, target }) {
      await deleteTuning(app, target.tuning, viewer.userId);
      return undefined;
    },
  }),
];
