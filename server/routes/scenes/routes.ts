import { z } from 'zod';
import { idSchema } from '../../../shared/contracts/common.ts';
import {
  probeQuerySchema,
  probeSchema,
  sceneListSchema,
  sceneSchema,
  tileParamsSchema,
  tileQuerySchema,
  updateSceneSchema,
} from '../../../shared/contracts/scene.ts';
import type { App } from '../../app-context.ts';
import type { Scene } from '../../entities/scene.ts';
import { presentProbe, presentScene } from '../../presenters/present-scene.ts';
import { createScene } from '../../services/create-scene.ts';
import { probeScene } from '../../services/scene-probe.ts';
import { cancelIngest, deleteScene, findScene, listScenes, loadSceneRow, updateScene } from '../../services/scenes.ts';
import { planSceneTile } from '../../services/tiles.ts';
import { findProjectTarget, projectParams } from '../find-project.ts';
import { route } from '../route.ts';
import { sendTile } from '../send-tile.ts';
import { showCurrent } from '../show-current.ts';
import { MAX_FILES, receiveUpload } from './receive-upload.ts';

const sceneParams = z.object({ sceneId: idSchema });

async function findSceneTarget(
  app: App,
  params: { sceneId: string },
): Promise<{ projectId: string; scene: Scene } | null> {
  const scene = await findScene(app, params.sceneId);
  return scene ? { projectId: scene.projectId, scene } : null;
}

export const sceneRoutes = [
  route({
    id: 'scenes.list',
    method: 'get',
    path: '/projects/:projectId/scenes',
    summary: 'Scenes of a project, latest first',
    access: { kind: 'project', action: 'scene.read', find: findProjectTarget },
    params: projectParams,
    answer: sceneListSchema,
    async handle({ app, params }) {
      return {
        scenes: (await listScenes(app, params.projectId)).map(presentScene),
        limits: { fileBytes: app.config.uploadLimitBytes, files: MAX_FILES },
      };
    },
  }),
  route({
    id: 'scenes.create',
    method: 'post',
    path: '/projects/:projectId/scenes',
    summary: 'Upload the files of one scene; its ingest runs in the background',
    access: { kind: 'project', action: 'scene.manage', find: findProjectTarget },
    params: projectParams,
    answer: sceneSchema,
    status: 201,
    multipart: {
      name: 'Name of the scene; the first file’s where not given. Before the files.',
      acquiredOn: 'Day of acquisition, yyyy-mm-dd. Before the files.',
      files: 'GeoTIFF, COG or JPEG 2000 files that show the same place in the same reference system',
    },
    handle: ({ app, params, viewer, req, res }) =>
      receiveUpload(app, req, res, async (upload) => {
        const id = await createScene(app, params.projectId, viewer.userId, upload);
        return presentScene(await loadSceneRow(app, id));
      }),
  }),
  route({
    id: 'scenes.read',
    method: 'get',
    path: '/scenes/:sceneId',
    summary: 'A scene with its band table, statistics and ingest',
    access: { kind: 'project', action: 'scene.read', find: findSceneTarget },
    params: sceneParams,
    answer: sceneSchema,
    async handle({ app, params }) {
      return presentScene(await loadSceneRow(app, params.sceneId));
    },
  }),
  route({
    id: 'scenes.update',
    method: 'patch',
    path: '/scenes/:sceneId',
    summary: 'Change name, day of acquisition or band table',
    access: { kind: 'project', action: 'scene.manage', find: findSceneTarget },
    params: sceneParams,
    body: updateSceneSchema,
    answer: sceneSchema,
    handle: ({ app, params, viewer, body, target }) =>
      showCurrent(
        async () => presentScene(await updateScene(app, target.scene, viewer.userId, body)),
        async () => presentScene(await loadSceneRow(app, params.sceneId)),
      ),
  }),
  route({
    id: 'scenes.delete',
    method: 'delete',
    path: '/scenes/:sceneId',
    summary: 'Delete a scene that no sample and no run uses, with its files',
    access: { kind: 'project', action: 'scene.manage', find: findSceneTarget },
    params: sceneParams,
    answer: 'none',
    async handle({ app, viewer, target }) {
      await deleteScene(app, target.scene, viewer.userId);
      return undefined;
    },
  }),
  route({
    id: 'scenes.cancel',
    method: 'post',
    path: '/scenes/:sceneId/cancel',
    summary: 'Stop the ingest of a scene',
    access: { kind: 'project', action: 'scene.manage', find: findSceneTarget },
    params: sceneParams,
    answer: sceneSchema,
    async handle({ app, target }) {
      return presentScene(await cancelIngest(app, target.scene));
    },
  }),
  route({
    id: 'scenes.tile',
    method: 'get',
    path: '/scenes/:sceneId/tiles/:z/:x/:y.webp',
    summary: 'A map tile of one band or three, in Web Mercator',
    access: { kind: 'project', action: 'scene.read', find: findSceneTarget },
    params: sceneParams.extend(tileParamsSchema.shape),
    query: tileQuerySchema,
    answer: { mediaType: 'image/webp' },
    handle: ({ app, params: { z, x, y }, query, target, req, res }) =>
      sendTile(req, res, planSceneTile(app, target.scene, { z, x, y }, query)),
  }),
  route({
    id: 'scenes.probe',
    method: 'get',
    path: '/scenes/:sceneId/probe',
    summary: 'Every band’s value at a place',
    access: { kind: 'project', action: 'scene.read', find: findSceneTarget },
    params: sceneParams,
    query: probeQuerySchema,
    answer: probeSchema,
    async handle({ app, query: { lon, lat }, target }) {
      return presentProbe(await probeScene(app, target.scene, lon, lat));
    },
  }),
];
