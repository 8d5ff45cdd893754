import { runComparisonQuerySchema, runComparisonSchema } from '../../../shared/contracts/run-comparison.ts';
import { compareTwoRuns } from '../../services/run-comparison.ts';
import { findProjectTarget, projectParams } from '../find-project.ts';
import { route } from '../route.ts';

export const comparisonRoutes = [
  route({
    id: 'runs.compare',
    method: 'get',
    path: '/projects/:projectId/run-comparison',
    summary: 'Two runs’ maps laid over each other: what became what, and McNemar’s test on the samples both held out',
    // It tells how right the maps are, so it takes the right to read accuracy.
    access: { kind: 'project', action: 'accuracy.read', find: findProjectTarget },
    params: projectParams,
    query: runComparisonQuerySchema,
    answer: runComparisonSchema,
    handle: ({ app, params, query }) => compareTwoRuns(app, params.projectId, query),
  }),
];
