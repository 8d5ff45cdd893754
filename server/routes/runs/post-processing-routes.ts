import { z } from 'zod';
import {
  changePostProcessingSchema,
  postProcessingPreviewSchema,
  previewPostProcessingSchema,
  runPostProcessingSchema,
} from '../../../shared/contracts/post-processing.ts';
import { tileParamsSchema } from '../../../shared/contracts/scene.ts';
import type { App } from '../../app-context.ts';
import type { Run } from '../../entities/run.ts';
import type { Viewer } from '../../policies/viewer.ts';
import { presentPostProcessing } from '../../presenters/present-post-processing.ts';
import { requireResult } from '../../services/accuracy.ts';
import { planClassTile } from '../../services/class-map-view.ts';
import {
  changePostProcessing,
  findRefusal,
  listRevisions,
  previewPostProcessing,
  requirePreview,
} from '../../services/post-processing.ts';
import { findRun } from '../../services/runs.ts';
import { route } from '../route.ts';
import { sendTile } from '../send-tile.ts';
import { findRunTarget, runParams } from './find-run.ts';

const read = { kind: 'project', action: 'run.read', find: findRunTarget } as const;
const change = { kind: 'project', action: 'run.start', find: findRunTarget } as const;
const previewParams = runParams.extend({ previewId: z.string().regex(/^[0-9a-f]{32}$/) });

async function show(app: App, run: Run, viewer: Viewer) {
  requireResult(run);
  const revisions = await listRevisions(app, run.id);
  return presentPostProcessing(run, revisions, await findRefusal(app.db.manager, run), viewer);
}

/** What is done to a run's map after the classifier. */
export const postProcessingRoutes = [
  route({
    id: 'post-processing.read',
    method: 'get',
    path: '/runs/:runId/post-processing',
    summary: 'The list of steps applied after mapping, its revisions, and what they changed',
    access: read,
    params: runParams,
    answer: runPostProcessingSchema,
    handle: ({ app, viewer, target }) => show(app, target.run, viewer),
  }),
  route({
    id: 'post-processing.change',
    method: 'post',
    path: '/runs/:runId/post-processing',
    summary: 'Keep a list of steps as the next revision and apply it to the classifier’s map',
    access: change,
    params: runParams,
    body: changePostProcessingSchema,
    answer: runPostProcessingSchema,
    status: 201,
    async handle({ app, viewer, target, body }) {
      await changePostProcessing(app, target.run, viewer, body);
      return show(app, (await findRun(app, target.run.id)) ?? target.run, viewer);
    },
  }),
  route({
    id: 'post-processing.preview',
    method: 'post',
    path: '/runs/:runId/post-processing/preview',
    summary: 'What a list of steps would make of the classifier’s map; nothing is kept',
    access: change,
    params: runParams,
    body: previewPostProcessingSchema,
    answer: postProcessingPreviewSchema,
    handle({ app, target, body, res }) {
      // Somebody who changes the list again hangs up on the preview before.
      const hangUp = new AbortController();
      res.on('close', () => hangUp.abort());
      return previewPostProcessing(app, target.run, body.steps, hangUp.signal);
    },
  }),
  route({
    id: 'post-processing.preview-tile',
    method: 'get',
    path: '/runs/:runId/post-processing/previews/:previewId/tiles/:z/:x/:y.webp',
    summary: 'A Web Mercator tile of a preview in class colours',
    access: change,
    params: previewParams.extend(tileParamsSchema.shape),
    answer: { mediaType: 'image/webp' },
    async handle({ app, params: { z: zoom, x, y, previewId }, target, req, res }) {
      const mapKey = await requirePreview(app, target.run, previewId);
      const map = { mapKey, classMapSha256: previewId };
      return sendTile(req, res, planClassTile(app, target.run, { z: zoom, x, y }, { named: previewId, map }));
    },
  }),
];
