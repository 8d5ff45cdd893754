import { reproductionListSchema, reproductionSchema } from '../../../shared/contracts/reproduction.ts';
import { retryRunSchema, runSchema } from '../../../shared/contracts/run.ts';
import { presentReproduction } from '../../presenters/present-reproduction.ts';
import { presentRun } from '../../presenters/present-run.ts';
import { can } from '../../policies/policy-table.ts';
import { areMapsWithheld } from '../../services/design-blindness.ts';
import { askReproduction, listReproductions } from '../../services/reproductions.ts';
import { retryRun } from '../../services/run-retry.ts';
import { route } from '../route.ts';
import { findRunTarget, runParams } from './find-run.ts';

/** Making a run once more: because it did not end well, or to see whether the same comes out. */
export const reproductionRoutes = [
  route({
    id: 'runs.retry',
    method: 'post',
    path: '/runs/:runId/retry',
    summary:
      'Put a failed or cancelled run back into the queue; it goes on from what it has made, unless told to begin anew',
    access: { kind: 'project', action: 'run.start', find: findRunTarget },
    params: runParams,
    body: retryRunSchema,
    answer: runSchema,
    async handle({ app, viewer, target, body }) {
      const isWithheld = await areMapsWithheld(app, target.projectId, viewer);
      return presentRun(await retryRun(app, target.run, viewer.userId, body), viewer, isWithheld);
    },
  }),
  route({
    id: 'runs.reproduce',
    method: 'post',
    path: '/runs/:runId/reproductions',
    summary: 'Make a finished run once more and compare the bytes of its class map',
    access: { kind: 'project', action: 'run.start', find: findRunTarget },
    params: runParams,
    answer: reproductionSchema,
    status: 201,
    handle: async ({ app, viewer, target }) =>
      presentReproduction(await askReproduction(app, target.run, viewer.userId)),
  }),
  route({
    id: 'runs.reproductions',
    method: 'get',
    path: '/runs/:runId/reproductions',
    summary: 'Attempts to reproduce a run and what came of them, newest first',
    access: { kind: 'project', action: 'run.read', find: findRunTarget },
    params: runParams,
    answer: reproductionListSchema,
    async handle({ app, viewer, target }) {
      const rows = await listReproductions(app, target.run.id);
      return {
        reproductions: rows.map(presentReproduction),
        abilities: { reproduce: target.run.result !== null && can('run.start', viewer.roles) },
      };
    },
  }),
];
