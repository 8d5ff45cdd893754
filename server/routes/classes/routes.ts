import { z } from 'zod';
import { idSchema } from '../../../shared/contracts/common.ts';
import {
  createLandClassSchema,
  deleteLandClassSchema,
  landClassListSchema,
  landClassSchema,
  orderLandClassesSchema,
  updateLandClassSchema,
} from '../../../shared/contracts/land-class.ts';
import type { App } from '../../app-context.ts';
import type { LandClass } from '../../entities/land-class.ts';
import { presentLandClass } from '../../presenters/present-land-class.ts';
import {
  createLandClass,
  deleteLandClass,
  findLandClass,
  listLandClasses,
  loadLandClassRow,
  orderLandClasses,
  updateLandClass,
} from '../../services/land-classes.ts';
import { findProjectTarget, projectParams } from '../find-project.ts';
import { route } from '../route.ts';
import { showCurrent } from '../show-current.ts';

const classParams = z.object({ classId: idSchema });

async function findClassTarget(
  app: App,
  params: { classId: string },
): Promise<{ projectId: string; landClass: LandClass } | null> {
  const landClass = await findLandClass(app, params.classId);
  return landClass ? { projectId: landClass.projectId, landClass } : null;
}

export const classRoutes = [
  route({
    id: 'classes.list',
    method: 'get',
    path: '/projects/:projectId/classes',
    summary: 'The class scheme in its order, with sample counts',
    access: { kind: 'project', action: 'class.read', find: findProjectTarget },
    params: projectParams,
    answer: landClassListSchema,
    async handle({ app, params }) {
      return { classes: (await listLandClasses(app, params.projectId)).map(presentLandClass) };
    },
  }),
  route({
    id: 'classes.create',
    method: 'post',
    path: '/projects/:projectId/classes',
    summary: 'Add a class at the end of the scheme; without a code it takes the next one',
    access: { kind: 'project', action: 'class.manage', find: findProjectTarget },
    params: projectParams,
    body: createLandClassSchema,
    answer: landClassSchema,
    status: 201,
    async handle({ app, params, viewer, body }) {
      return presentLandClass(await createLandClass(app, params.projectId, viewer.userId, body));
    },
  }),
  route({
    id: 'classes.order',
    method: 'put',
    path: '/projects/:projectId/classes/order',
    summary: 'Put the classes into an order; digit keys follow it',
    access: { kind: 'project', action: 'class.manage', find: findProjectTarget },
    params: projectParams,
    body: orderLandClassesSchema,
    answer: landClassListSchema,
    async handle({ app, params, viewer, body }) {
      const rows = await orderLandClasses(app, params.projectId, viewer.userId, body.ids);
      return { classes: rows.map(presentLandClass) };
    },
  }),
  route({
    id: 'classes.update',
    method: 'patch',
    path: '/classes/:classId',
    summary: 'Change code, name, colour or definition',
    access: { kind: 'project', action: 'class.manage', find: findClassTarget },
    params: classParams,
    body: updateLandClassSchema,
    answer: landClassSchema,
    handle: ({ app, params, viewer, body, target }) =>
      showCurrent(
        async () => presentLandClass(await updateLandClass(app, target.landClass, viewer.userId, body)),
        async () => presentLandClass(await loadLandClassRow(app, params.classId)),
      ),
  }),
  route({
    id: 'classes.delete',
    method: 'delete',
    path: '/classes/:classId',
    summary: 'Delete a class; its samples go to the class named',
    access: { kind: 'project', action: 'class.manage', find: findClassTarget },
    params: classParams,
    body: deleteLandClassSchema,
    answer: 'none',
    async handle({ app, viewer, body, target }) {
      await deleteLandClass(app, target.landClass, viewer.userId, body.moveSamplesTo);
      return undefined;
    },
  }),
];
