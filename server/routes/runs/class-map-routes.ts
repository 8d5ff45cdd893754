import { z } from 'zod';
import { pipeline } from 'node:stream/promises';
import type { Response } from 'express';
import { runLayerSchema, runProbeSchema, runVotesSchema } from '../../../shared/contracts/run.ts';
import { probeQuerySchema, tileParamsSchema } from '../../../shared/contracts/scene.ts';
import { listClassAreas } from '../../presenters/present-run.ts';
import { requireResult } from '../../services/accuracy.ts';
import { nameDownload, packClassMap } from '../../services/class-map-package.ts';
import { probeClassMap, planClassTile } from '../../services/class-map-view.ts';
import { planLayerTile, readVotes, requireLayer } from '../../services/run-layers.ts';
import type { App } from '../../app-context.ts';
import { findProject } from '../../services/projects.ts';
import { route } from '../route.ts';
import { sendTile } from '../send-tile.ts';
import { findRunTarget, runParams } from './find-run.ts';

const read = { kind: 'project', action: 'run.read', find: findRunTarget } as const;

/** A browser that hangs up in the middle of a download is no failure of the server. */
function isHangUp(error: unknown): boolean {
  return (error as NodeJS.ErrnoException).code === 'ERR_STREAM_PREMATURE_CLOSE';
}

const classTileQuerySchema = z.object({
  /** Codes of classes to leave transparent, with commas between. */
  /** Digest of the map that is wanted; tiles of it may be kept for good. */
  v: z.string().max(64).optional(),
  hide: z
    .string()
    .regex(/^\d{1,3}(,\d{1,3})*$/, 'Class codes with commas between, such as 3,7.')
    .transform((text) => text.split(',').map(Number))
    .optional(),
});
const layerParams = runParams.extend({ layer: runLayerSchema });

async function sendTiff(app: App, res: Response, key: string, name: string): Promise<undefined> {
  const stream = await app.files.stream(key);
  res.attachment(`${name}.tif`);
  res.type('image/tiff');
  res.setHeader('Content-Length', await app.files.sizeBytes(key));
  res.setHeader('Cache-Control', 'private, no-cache');
  await pipeline(stream, res).catch((error: unknown) => {
    if (!isHangUp(error)) throw error;
  });
  return undefined;
}

export const classMapRoutes = [
  route({
    id: 'runs.tile',
    method: 'get',
    path: '/runs/:runId/tiles/:z/:x/:y.webp',
    summary: 'A Web Mercator tile of the class map in its class colours',
    access: read,
    params: runParams.extend(tileParamsSchema.shape),
    query: classTileQuerySchema,
    answer: { mediaType: 'image/webp' },
    handle: ({ app, params: { z, x, y }, query, target, req, res }) =>
      sendTile(req, res, planClassTile(app, target.run, { z, x, y }, { named: query.v, hiddenCodes: query.hide })),
  }),
  route({
    id: 'runs.probe',
    method: 'get',
    path: '/runs/:runId/probe',
    summary: 'The mapped class at a position',
    access: read,
    params: runParams,
    query: probeQuerySchema,
    answer: runProbeSchema,
    handle: ({ app, target, query }) => probeClassMap(app, target.run, query.lon, query.lat),
  }),
  route({
    id: 'runs.votes',
    method: 'get',
    path: '/runs/:runId/votes',
    summary: 'How the model of a run votes on the pixel at a position',
    access: read,
    params: runParams,
    query: probeQuerySchema,
    answer: runVotesSchema,
    handle: ({ app, target, query }) => readVotes(app, target.run, query.lon, query.lat),
  }),
  route({
    id: 'runs.layer-tile',
    method: 'get',
    path: '/runs/:runId/layers/:layer/tiles/:z/:x/:y.webp',
    summary: 'A Web Mercator tile of how sure the map is: confidence or margin',
    access: read,
    params: layerParams.extend(tileParamsSchema.shape),
    answer: { mediaType: 'image/webp' },
    handle: ({ app, params: { layer, z, x, y }, target, req, res }) =>
      sendTile(req, res, planLayerTile(app, target.run, layer, { z, x, y })),
  }),
  route({
    id: 'runs.layer',
    method: 'get',
    path: '/runs/:runId/layers/:layer.tif',
    summary: 'Confidence or margin as a GeoTIFF in whole percent, 255 where nothing is mapped',
    access: read,
    params: layerParams,
    answer: { mediaType: 'image/tiff' },
    async handle({ app, target, params, res }) {
      const key = requireLayer(target.run, params.layer);
      return sendTiff(app, res, key, nameDownload(target.run, params.layer));
    },
  }),
  route({
    id: 'runs.class-map',
    method: 'get',
    path: '/runs/:runId/class-map.tif',
    summary: 'The class map as a GeoTIFF with colour table and class names',
    access: read,
    params: runParams,
    answer: { mediaType: 'image/tiff' },
    async handle({ app, target, res }) {
      return sendTiff(app, res, requireResult(target.run).mapKey, nameDownload(target.run, 'class-map'));
    },
  }),
  route({
    id: 'runs.class-map-package',
    method: 'get',
    path: '/runs/:runId/class-map.zip',
    summary: 'The class map with its class names, areas, and what to know before relying on it',
    access: read,
    params: runParams,
    answer: { mediaType: 'application/zip' },
    async handle({ app, target, res }) {
      const { run, projectId } = target;
      requireResult(run);
      const project = await findProject(app, projectId);
      const stream = await packClassMap(app, run, project?.name ?? '', listClassAreas(run) ?? []);
      res.attachment(`${nameDownload(run, 'class-map')}.zip`);
      res.type('application/zip');
      res.setHeader('Cache-Control', 'private, no-cache');
      await pipeline(stream, res).catch((error: unknown) => {
        if (!isHangUp(error)) throw error;
      });
      return undefined;
    },
  }),
];
