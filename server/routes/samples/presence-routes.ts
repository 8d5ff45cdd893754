import { leaveDeskSchema, presenceListSchema, sayPresenceSchema } from '../../../shared/contracts/presence.ts';
import type { App } from '../../app-context.ts';
import { leaveDesk, listPresences, sayPresence } from '../../services/presences.ts';
import { findProjectTarget, projectParams } from '../find-project.ts';
import { route } from '../route.ts';

async function showPresences(app: App, projectId: string) {
  const rows = await listPresences(app, projectId);
  return {
    people: rows.map(({ userId, user, editingSampleId, seenAt }) => ({
      person: { id: userId, name: user.name },
      editingSampleId,
      seenAt: seenAt.toISOString(),
    })),
  };
}

export const presenceRoutes = [
  route({
    id: 'presence.list',
    method: 'get',
    path: '/projects/:projectId/presence',
    summary: 'Who has the sampling desk open, and which sample each is changing',
    access: { kind: 'project', action: 'sample.read', find: findProjectTarget },
    params: projectParams,
    answer: presenceListSchema,
    handle: ({ app, params }) => showPresences(app, params.projectId),
  }),
  route({
    id: 'presence.say',
    method: 'post',
    path: '/projects/:projectId/presence',
    summary: 'Say that a desk is open and what is changed at it; to be said again every few seconds',
    access: { kind: 'project', action: 'sample.read', find: findProjectTarget },
    params: projectParams,
    body: sayPresenceSchema,
    answer: presenceListSchema,
    async handle({ app, viewer, params, body }) {
      await sayPresence(app, params.projectId, viewer.userId, body);
      return showPresences(app, params.projectId);
    },
  }),
  route({
    id: 'presence.leave',
    method: 'delete',
    path: '/projects/:projectId/presence',
    summary: 'Close a desk',
    access: { kind: 'project', action: 'sample.read', find: findProjectTarget },
    params: projectParams,
    body: leaveDeskSchema,
    answer: 'none',
    async handle({ app, viewer, params, body }) {
      await leaveDesk(app, params.projectId, viewer.userId, body.deskId);
      return undefined;
    },
  }),
];
