import {
  accuracyQuerySchema,
  accuracySchema,
  cellQuerySchema,
  cellSamplesSchema,
} from '../../../shared/contracts/accuracy.ts';
import { presentAccuracy } from '../../presenters/present-accuracy.ts';
import { writeAccuracyCsv } from '../../services/accuracy-csv.ts';
import { findCellSamples, readAccuracy } from '../../services/accuracy.ts';
import { nameDownload } from '../../services/class-map-package.ts';
import { findProject } from '../../services/projects.ts';
import { hideWhileInterpreting } from '../hide-while-interpreting.ts';
import { route } from '../route.ts';
import { findRunTarget, runParams } from '../runs/find-run.ts';

const read = { kind: 'project', action: 'accuracy.read', find: findRunTarget } as const;

export const accuracyRoutes = [
  route({
    id: 'accuracy.read',
    method: 'get',
    path: '/runs/:runId/accuracy',
    summary: 'Confusion matrix and accuracy figures from the held-out samples, by pixel or by polygon',
    access: read,
    params: runParams,
    query: accuracyQuerySchema,
    answer: accuracySchema,
    async handle({ app, target, query: { unit } }) {
      return presentAccuracy(target.run, unit, await readAccuracy(app, target.run, unit));
    },
  }),
  route({
    id: 'accuracy.csv',
    method: 'get',
    path: '/runs/:runId/accuracy.csv',
    summary: 'The same as CSV',
    access: read,
    params: runParams,
    query: accuracyQuerySchema,
    answer: { mediaType: 'text/csv' },
    async handle({ app, target, query: { unit }, res }) {
      const { run, projectId } = target;
      const project = await findProject(app, projectId);
      const accuracy = presentAccuracy(run, unit, await readAccuracy(app, run, unit));
      res.attachment(`${nameDownload(run, `accuracy-by-${unit}`)}.csv`);
      res.type('text/csv; charset=utf-8');
      res.setHeader('Cache-Control', 'private, no-cache');
      // The mark tells spreadsheets that the text is UTF-8.
      res.send(`\uFEFF${writeAccuracyCsv(run, project?.name ?? '', accuracy)}`);
      return undefined;
    },
  }),
  route({
    id: 'accuracy.cell',
    method: 'get',
    path: '/runs/:runId/accuracy/cell',
    summary: 'The held-out samples behind a cell of the confusion matrix',
    access: read,
    params: runParams,
    query: accuracyQuerySchema.extend(cellQuerySchema.shape),
    answer: cellSamplesSchema,
    handle: ({ app, target, query: { unit, ...cell } }) => findCellSamples(app, target.run, unit, cell),
  }),
].map(hideWhileInterpreting);
