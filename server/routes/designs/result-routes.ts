import {
  agreementSchema,
  answerSheetSchema,
  cellPointsQuerySchema,
  cellPointsSchema,
  compareKappasQuerySchema,
  compareMapsQuerySchema,
  estimatesSchema,
  kappaComparisonSchema,
  mapComparisonSchema,
} from '../../../shared/contracts/reference.ts';
import { presentCellPoint } from '../../presenters/present-design.ts';
import { zoneEstimatesQuerySchema, zoneEstimatesSchema } from '../../../shared/contracts/zone.ts';
import { estimateZones } from '../../services/design-zone-estimates.ts';
import { measureAgreement } from '../../services/design-agreement.ts';
import { compareRuns } from '../../services/design-comparison.ts';
import { compareKappas } from '../../services/design-kappas.ts';
import { requireMapsShown } from '../../services/design-blindness.ts';
import { writeEstimatesCsv, writePointsCsv } from '../../services/design-csv.ts';
import { estimateDesign } from '../../services/design-estimates.ts';
import { listCellPoints } from '../../services/design-cell.ts';
import { listSheetPoints } from '../../services/design-sheet.ts';
import { loadAnsweredPoints } from '../../services/design-settle.ts';
import type { Response } from 'express';
import { hideWhileInterpreting } from '../hide-while-interpreting.ts';
import { route } from '../route.ts';
import { designParams, findDesignTarget, findPlace } from './find-design.ts';

const estimates = { kind: 'project', action: 'design.estimates', find: findDesignTarget } as const;
const read = { kind: 'project', action: 'design.read', find: findDesignTarget } as const;

function sendCsv(res: Response, name: string, text: string): void {
  res.attachment(`${name}.csv`);
  res.type('text/csv; charset=utf-8');
  res.setHeader('Cache-Control', 'private, no-cache');
  // The mark tells spreadsheets that the text is UTF-8.
  res.send(`\uFEFF${text}`);
}

/** What the points say of the map, so interpreters of an open design of the project are refused. */
const estimateRoutes = [
  route({
    id: 'designs.estimates',
    method: 'get',
    path: '/designs/:designId/estimates',
    summary: 'Design-based accuracy and area of each class with intervals, and how each figure was computed',
    access: estimates,
    params: designParams,
    answer: estimatesSchema,
    handle: ({ app, target }) => estimateDesign(app, target.design),
  }),
  route({
    id: 'designs.estimates-csv',
    method: 'get',
    path: '/designs/:designId/estimates.csv',
    summary: 'The same as CSV',
    access: estimates,
    params: designParams,
    answer: { mediaType: 'text/csv' },
    async handle({ app, target: { design }, res }) {
      const text = writeEstimatesCsv(await estimateDesign(app, design));
      sendCsv(res, `reference-design-${design.number}-estimates`, text);
      return undefined;
    },
  }),
  route({
    id: 'designs.compare',
    method: 'get',
    path: '/designs/:designId/compare',
    summary: 'Overall accuracy of two maps on the same points: difference with its interval, and McNemar’s test',
    access: estimates,
    params: designParams,
    query: compareMapsQuerySchema,
    answer: mapComparisonSchema,
    handle: ({ app, target, query }) => compareRuns(app, target.design, query.runId),
  }),
  route({
    id: 'designs.compare-kappas',
    method: 'get',
    path: '/designs/:designId/kappas',
    summary: 'Kappas of two maps judged by independent designs, and whether they differ',
    access: estimates,
    params: designParams,
    query: compareKappasQuerySchema,
    answer: kappaComparisonSchema,
    handle: ({ app, target, query }) => compareKappas(app, target.design, query.designId),
  }),
  route({
    id: 'designs.zones',
    method: 'get',
    path: '/designs/:designId/zones',
    summary: 'Accuracy and class shares of each zone of a layer, from the points in it',
    access: estimates,
    params: designParams,
    query: zoneEstimatesQuerySchema,
    answer: zoneEstimatesSchema,
    handle: ({ app, target, query }) => estimateZones(app, target.design, query.layerId),
  }),
  route({
    id: 'designs.cell',
    method: 'get',
    path: '/designs/:designId/cell',
    summary: 'The reference points behind a cell of the matrix',
    access: estimates,
    params: designParams,
    query: cellPointsQuerySchema,
    answer: cellPointsSchema,
    async handle({ app, query, target: { design } }) {
      const points = await listCellPoints(app, design, query.mapped, query.reference);
      const placed = await findPlace(app, design);
      return { points: points.map((point) => presentCellPoint(design, placed, point)) };
    },
  }),
].map(hideWhileInterpreting);

export const resultRoutes = [
  ...estimateRoutes,
  route({
    id: 'designs.sheet',
    method: 'get',
    path: '/designs/:designId/sheet',
    summary: 'Where the points are, for an answer sheet on paper; nothing of map or answers',
    access: read,
    params: designParams,
    answer: answerSheetSchema,
    handle: ({ app, target }) => listSheetPoints(app, target.design),
  }),
  route({
    id: 'designs.agreement',
    method: 'get',
    path: '/designs/:designId/agreement',
    summary: 'How far the interpreters agree, with intervals, once interpretation has ended',
    access: read,
    params: designParams,
    answer: agreementSchema,
    async handle({ app, viewer, target: { design } }) {
      if (design.state === 'closed') await requireMapsShown(app, design.projectId, viewer);
      return measureAgreement(app, design);
    },
  }),
  route({
    id: 'designs.points-csv',
    method: 'get',
    path: '/designs/:designId/points.csv',
    summary: 'The points: an answer sheet before the design is closed, with map, answers and decisions afterwards',
    access: read,
    params: designParams,
    answer: { mediaType: 'text/csv' },
    async handle({ app, viewer, target: { design }, res }) {
      if (design.state === 'closed') await requireMapsShown(app, design.projectId, viewer);
      const text = writePointsCsv(design, await loadAnsweredPoints(app, design.id));
      sendCsv(res, `reference-design-${design.number}-${design.state === 'closed' ? 'points' : 'answer-sheet'}`, text);
      return undefined;
    },
  }),
];
