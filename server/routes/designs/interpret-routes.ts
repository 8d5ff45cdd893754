import { z } from 'zod';
import { emptySchema } from '../../../shared/contracts/common.ts';
import {
  blindPointSchema,
  disagreementListSchema,
  disagreementSchema,
  importAnswersSchema,
  importReportSchema,
  nextPointSchema,
  putAnswerSchema,
  putDecisionSchema,
} from '../../../shared/contracts/reference.ts';
import { presentBlindPoint, presentDisagreement, presentNextPoint } from '../../presenters/present-design.ts';
import { decidePoint, listDisagreements } from '../../services/design-adjudication.ts';
import { putAnswer, readNextPoint, readOwnPoint, skipPoint } from '../../services/design-answers.ts';
import { requireMapsShown } from '../../services/design-blindness.ts';
import { importAnswers, readAnswerCsv, readAnswerFile } from '../../services/design-import.ts';
import { receiveFiles } from '../receive-files.ts';
import { route } from '../route.ts';
import { designParams, findDesignTarget, findPlace, findPointTarget, pointParams } from './find-design.ts';

const ofDesign = { kind: 'project', action: 'design.interpret', find: findDesignTarget } as const;
const ofPoint = { kind: 'project', action: 'design.interpret', find: findPointTarget } as const;

const importFields = z.object({
  dryRun: z
    .enum(['true', 'false'])
    .default('false')
    .transform((said) => said === 'true'),
});

/** The blind check. Nothing here reads what the map shows. */
export const interpretRoutes = [
  route({
    id: 'designs.next',
    method: 'get',
    path: '/designs/:designId/next',
    summary: 'The next reference point that waits for you, in your own random order',
    access: ofDesign,
    params: designParams,
    answer: nextPointSchema,
    async handle({ app, viewer, target: { design } }) {
      return presentNextPoint(design, await findPlace(app, design), await readNextPoint(app, design, viewer.userId));
    },
  }),
  route({
    id: 'designs.point',
    method: 'get',
    path: '/designs/:designId/points/:number',
    summary: 'A reference point by its number, with your own answer',
    access: ofDesign,
    params: designParams.extend({ number: z.coerce.number().int().min(1) }),
    answer: blindPointSchema,
    async handle({ app, viewer, params, target: { design } }) {
      const { own, progress } = await readOwnPoint(app, design, viewer.userId, params.number);
      return presentBlindPoint(design, await findPlace(app, design), own, progress);
    },
  }),
  route({
    id: 'reference-points.answer',
    method: 'put',
    path: '/points/:pointId/answer',
    summary: 'Say what a reference point is, or change what you said',
    access: ofPoint,
    params: pointParams,
    body: putAnswerSchema,
    answer: blindPointSchema,
    async handle({ app, viewer, target: { design, point }, body }) {
      await putAnswer(app, design, point, viewer.userId, body);
      const { own, progress } = await readOwnPoint(app, design, viewer.userId, point.number);
      return presentBlindPoint(design, await findPlace(app, design), own, progress);
    },
  }),
  route({
    id: 'reference-points.skip',
    method: 'post',
    path: '/points/:pointId/skip',
    summary: 'Put a reference point off; it comes again at the end',
    access: ofPoint,
    params: pointParams,
    body: emptySchema,
    answer: nextPointSchema,
    async handle({ app, viewer, target: { design, point } }) {
      await skipPoint(app, design, point, viewer.userId);
      return presentNextPoint(design, await findPlace(app, design), await readNextPoint(app, design, viewer.userId));
    },
  }),
  route({
    id: 'designs.import',
    method: 'post',
    path: '/designs/:designId/import',
    summary: 'Take your answers from a CSV file, with a report on every row',
    access: ofDesign,
    params: designParams,
    body: importAnswersSchema,
    answer: importReportSchema,
    handle: ({ app, viewer, target, body: { csv, dryRun } }) =>
      importAnswers(app, target.design, viewer.userId, { table: readAnswerCsv(csv), dryRun }),
  }),
  route({
    id: 'designs.import-file',
    method: 'post',
    path: '/designs/:designId/import-file',
    summary: 'Take your answers from a file with points, with a report on every feature',
    access: ofDesign,
    params: designParams,
    answer: importReportSchema,
    multipart: {
      dryRun: 'true only reports what would become of each feature. Before the file.',
      files: 'One GeoPackage, GeoJSON, KML or zipped Shapefile of points with class_code or class',
    },
    handle: ({ app, viewer, target, req, res }) =>
      receiveFiles(app, req, res, { fields: importFields, maxFiles: 1 }, async ({ fields, files: [file] }) => {
        const table = await readAnswerFile(app, file?.path ?? '');
        return importAnswers(app, target.design, viewer.userId, { table, dryRun: fields.dryRun });
      }),
  }),
  route({
    id: 'designs.disagreements',
    method: 'get',
    path: '/designs/:designId/disagreements',
    summary: 'Points whose answers differ or that nobody answered, once interpretation has ended',
    access: { kind: 'project', action: 'design.adjudicate', find: findDesignTarget },
    params: designParams,
    answer: disagreementListSchema,
    async handle({ app, viewer, target: { design } }) {
      // A design that carries this one on shows the same points.
      if (design.state === 'closed') await requireMapsShown(app, design.projectId, viewer);
      const rows = await listDisagreements(app, design);
      const placed = await findPlace(app, design);
      return {
        disagreements: rows.map((row) => presentDisagreement(design, placed, row)),
        undecided: rows.filter(({ settled }) => settled === null).length,
      };
    },
  }),
  route({
    id: 'reference-points.decide',
    method: 'put',
    path: '/points/:pointId/decision',
    summary: 'Decide what a disputed or unanswered point is',
    access: { kind: 'project', action: 'design.adjudicate', find: findPointTarget },
    params: pointParams,
    body: putDecisionSchema,
    answer: disagreementSchema,
    async handle({ app, viewer, target: { design, point }, body }) {
      const row = await decidePoint(app, design, point.id, viewer.userId, body);
      return presentDisagreement(design, await findPlace(app, design), row);
    },
  }),
];
