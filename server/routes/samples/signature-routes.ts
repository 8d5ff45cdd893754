import { idSchema } from '../../../shared/contracts/common.ts';
import { growRegionSchema, grownRegionSchema } from '../../../shared/contracts/sample.ts';
import {
  drawingJudgementSchema,
  judgeDrawingSchema,
  signatureQuerySchema,
  signatureSetSchema,
} from '../../../shared/contracts/signature.ts';
import { growFromPixel } from '../../services/grow-from-pixel.ts';
import { judgeDrawing } from '../../services/drawing-judgement.ts';
import { findDrawingScene } from '../../services/samples.ts';
import { describeSignatures } from '../../services/signatures.ts';
import { findProjectTarget, projectParams } from '../find-project.ts';
import { route } from '../route.ts';

export const signatureRoutes = [
  route({
    id: 'samples.grow',
    method: 'post',
    path: '/projects/:projectId/samples/grow',
    summary:
      'The connected pixels about a place whose spectrum is like the one there, as an outline; nothing is stored',
    access: { kind: 'project', action: 'sample.draw', find: findProjectTarget },
    params: projectParams,
    body: growRegionSchema,
    answer: grownRegionSchema,
    async handle({ app, body, target: { project } }) {
      const scene = await findDrawingScene(app, project.id, body.sceneId);
      return growFromPixel(app, project, scene, body);
    },
  }),
  route({
    id: 'signatures.read',
    method: 'get',
    path: '/projects/:projectId/signatures/:sceneId',
    summary: 'Signatures of the classes in a scene, how far apart they lie, and the pixels behind them',
    access: { kind: 'project', action: 'sample.read', find: findProjectTarget },
    params: projectParams.extend({ sceneId: idSchema }),
    query: signatureQuerySchema,
    answer: signatureSetSchema,
    async handle({ app, viewer, params, query, target: { project } }) {
      const scene = await findDrawingScene(app, project.id, params.sceneId);
      const bands = query.bands ? query.bands.split(',').map(Number) : null;
      return describeSignatures(app, project, scene, bands, viewer.userId);
    },
  }),
  route({
    id: 'samples.judge',
    method: 'post',
    path: '/projects/:projectId/samples/judge',
    summary:
      'How a drawing stands to the samples there are: typical, mixed, overlapping, near held-out ones; nothing is stored',
    access: { kind: 'project', action: 'sample.read', find: findProjectTarget },
    params: projectParams,
    body: judgeDrawingSchema,
    answer: drawingJudgementSchema,
    async handle({ app, viewer, body, target: { project } }) {
      const scene = await findDrawingScene(app, project.id, body.sceneId);
      return judgeDrawing(app, project, scene, body, viewer.userId);
    },
  }),
];
