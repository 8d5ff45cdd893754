import {
  recipeCheckSchema,
  recipeSchema,
  runListSchema,
  runSchema,
  startRunSchema,
} from '../../../shared/contracts/run.ts';
import { presentRun } from '../../presenters/present-run.ts';
import { areMapsWithheld } from '../../services/design-blindness.ts';
import { checkRecipe } from '../../services/recipe-check.ts';
import { cancelRun, deleteRun, listRuns, startRun } from '../../services/runs.ts';
import { findProjectTarget, projectParams } from '../find-project.ts';
import { hideWhileInterpreting } from '../hide-while-interpreting.ts';
import { route } from '../route.ts';
import { classMapRoutes } from './class-map-routes.ts';
import { comparisonRoutes } from './comparison-routes.ts';
import { postProcessingRoutes } from './post-processing-routes.ts';
import { reproductionRoutes } from './reproduction-routes.ts';
import { findRunTarget, runParams } from './find-run.ts';

export const runRoutes = [
  route({
    id: 'runs.list',
    method: 'get',
    path: '/projects/:projectId/runs',
    summary: 'Runs of a project, newest first',
    access: { kind: 'project', action: 'run.read', find: findProjectTarget },
    params: projectParams,
    answer: runListSchema,
    async handle({ app, viewer, params }) {
      const runs = await listRuns(app, params.projectId);
      const isWithheld = await areMapsWithheld(app, params.projectId, viewer);
      return { runs: runs.map((run) => presentRun(run, viewer, isWithheld)) };
    },
  }),
  route({
    id: 'runs.start',
    method: 'post',
    path: '/projects/:projectId/runs',
    summary: 'Start a run; it waits its turn in the queue',
    access: { kind: 'project', action: 'run.start', find: findProjectTarget },
    params: projectParams,
    body: startRunSchema,
    answer: runSchema,
    status: 201,
    async handle({ app, viewer, target, body }) {
      return presentRun(await startRun(app, target.project, viewer.userId, body), viewer);
    },
  }),
  route({
    id: 'runs.check',
    method: 'post',
    path: '/projects/:projectId/runs/check',
    summary: 'What stops a recipe, what to think of, and how its samples would be split',
    access: { kind: 'project', action: 'run.start', find: findProjectTarget },
    params: projectParams,
    body: recipeSchema,
    answer: recipeCheckSchema,
    async handle({ app, target, body }) {
      const { problems, perClass } = await checkRecipe(app, target.project, body);
      return { problems: problems.map(({ severity, text }) => ({ severity, text })), perClass };
    },
  }),
  route({
    id: 'runs.read',
    method: 'get',
    path: '/runs/:runId',
    summary: 'A run: recipe, progress, areas',
    access: { kind: 'project', action: 'run.read', find: findRunTarget },
    params: runParams,
    answer: runSchema,
    handle: async ({ app, viewer, target }) =>
      presentRun(target.run, viewer, await areMapsWithheld(app, target.projectId, viewer)),
  }),
  route({
    id: 'runs.delete',
    method: 'delete',
    path: '/runs/:runId',
    summary: 'Delete an ended run with its class map',
    access: { kind: 'project', action: 'run.stop', find: findRunTarget },
    params: runParams,
    answer: 'none',
    async handle({ app, viewer, target }) {
      await deleteRun(app, target.run, viewer.userId);
      return undefined;
    },
  }),
  route({
    id: 'runs.cancel',
    method: 'post',
    path: '/runs/:runId/cancel',
    summary: 'Stop a run that waits or works; what it has made so far is removed',
    access: { kind: 'project', action: 'run.stop', find: findRunTarget },
    params: runParams,
    answer: runSchema,
    async handle({ app, viewer, target }) {
      const isWithheld = await areMapsWithheld(app, target.projectId, viewer);
      return presentRun(await cancelRun(app, target.run, viewer.userId), viewer, isWithheld);
    },
  }),
  ...reproductionRoutes,
  ...[...classMapRoutes, ...comparisonRoutes, ...postProcessingRoutes].map(hideWhileInterpreting),
];
