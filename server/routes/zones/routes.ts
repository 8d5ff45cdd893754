import { z } from 'zod';
import { idSchema } from '../../../shared/contracts/common.ts';
import { lineSchema } from '../../../shared/contracts/text.ts';
import { zoneLayerListSchema, zoneLayerSchema } from '../../../shared/contracts/zone.ts';
import type { App } from '../../app-context.ts';
import type { ZoneLayer } from '../../entities/zone-layer.ts';
import { can } from '../../policies/policy-table.ts';
import { presentZoneLayer } from '../../presenters/present-zone-layer.ts';
import { addZoneLayer, deleteZoneLayer, findZoneLayer, listZoneLayers } from '../../services/zone-layers.ts';
import { findProjectTarget, projectParams } from '../find-project.ts';
import { receiveFiles } from '../receive-files.ts';
import { route } from '../route.ts';

async function findLayerTarget(
  app: App,
  params: { layerId: string },
): Promise<{ projectId: string; layer: ZoneLayer } | null> {
  const layer = await findZoneLayer(app, params.layerId);
  return layer ? { projectId: layer.projectId, layer } : null;
}

const fields = z.object({
  name: lineSchema(120).default(''),
  nameField: lineSchema(120).default(''),
});

export const zoneRoutes = [
  route({
    id: 'zone-layers.list',
    method: 'get',
    path: '/projects/:projectId/zone-layers',
    summary: 'Zone layers of a project, oldest first, without their outlines',
    access: { kind: 'project', action: 'design.read', find: findProjectTarget },
    params: projectParams,
    answer: zoneLayerListSchema,
    async handle({ app, viewer, params }) {
      const layers = await listZoneLayers(app, params.projectId);
      return {
        layers: layers.map((layer) => presentZoneLayer(layer, viewer)),
        abilities: { add: can('design.plan', viewer.roles) },
      };
    },
  }),
  route({
    id: 'zone-layers.add',
    method: 'post',
    path: '/projects/:projectId/zone-layers',
    summary: 'Bring in zones from a vector file, one a feature',
    access: { kind: 'project', action: 'design.plan', find: findProjectTarget },
    params: projectParams,
    answer: zoneLayerSchema,
    status: 201,
    multipart: {
      name: 'Name of the layer; the file’s where not given. Before the file.',
      nameField: 'Field with the names of the zones; the first one of text where not given. Before the file.',
      files: 'One GeoJSON, GeoPackage, KML or zipped Shapefile of polygons',
    },
    handle: ({ app, params, viewer, req, res }) =>
      receiveFiles(app, req, res, { fields, maxFiles: 1 }, async ({ fields: said, files: [file] }) => {
        const layer = await addZoneLayer(app, params.projectId, viewer.userId, {
          path: file?.path ?? '',
          name: said.name || (file?.name ?? '').replace(/\.[^.]*$/, '').slice(0, 120),
          nameField: said.nameField || null,
        });
        return presentZoneLayer(layer, viewer);
      }),
  }),
  route({
    id: 'zone-layers.delete',
    method: 'delete',
    path: '/zone-layers/:layerId',
    summary: 'Remove a zone layer; designs drawn by it keep their strata',
    access: { kind: 'project', action: 'design.plan', find: findLayerTarget },
    params: z.object({ layerId: idSchema }),
    answer: 'none',
    async handle({ app, viewer, target }) {
      await deleteZoneLayer(app, target.layer, viewer.userId);
      return undefined;
    },
  }),
];
