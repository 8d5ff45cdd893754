import {
  createProjectSchema,
  deleteProjectSchema,
  overviewSchema,
  projectListSchema,
  projectSchema,
  setStudyAreaSchema,
  updateProjectSchema,
} from '../../../shared/contracts/project.ts';
import type { App } from '../../app-context.ts';
import type { Project } from '../../entities/project.ts';
import { can } from '../../policies/policy-table.ts';
import type { Viewer } from '../../policies/viewer.ts';
import { presentActivity, presentProject, presentProjectSummary } from '../../presenters/present-project.ts';
import { listActivities } from '../../services/activities.ts';
import { buildOverview } from '../../services/overview.ts';
import {
  countProject,
  createProject,
  deleteProject,
  listMyMemberships,
  setStudyArea,
  updateProject,
} from '../../services/projects.ts';
import { checkStudyArea } from '../../services/study-area.ts';
import { findProjectTarget, projectParams } from '../find-project.ts';
import { route } from '../route.ts';

const ACTIVITY_LINES = 30;

async function show(app: App, project: Project, viewer: Viewer) {
  const counts = can('overview.read', viewer.roles) ? await countProject(app, project.id) : null;
  return presentProject(project, viewer.roles, counts);
}

export const projectRoutes = [
  route({
    id: 'projects.list',
    method: 'get',
    path: '/projects',
    summary: 'Projects I am a member of, last changed first',
    access: { kind: 'account' },
    answer: projectListSchema,
    async handle({ app, viewer }) {
      const memberships = await listMyMemberships(app, viewer.userId);
      return { projects: memberships.map(({ project, roles }) => presentProjectSummary(project, roles)) };
    },
  }),
  route({
    id: 'projects.create',
    method: 'post',
    path: '/projects',
    summary: 'Create a project; its maker is the lead',
    access: { kind: 'account' },
    body: createProjectSchema,
    answer: projectSchema,
    status: 201,
    async handle({ app, viewer, body }) {
      const project = await createProject(app, viewer.userId, body);
      return show(app, project, { ...viewer, roles: ['lead'] });
    },
  }),
  route({
    id: 'projects.read',
    method: 'get',
    path: '/projects/:projectId',
    summary: 'A project, its stages, and what I may do in it',
    access: { kind: 'project', action: 'project.read', find: findProjectTarget },
    params: projectParams,
    answer: projectSchema,
    handle: ({ app, viewer, target }) => show(app, target.project, viewer),
  }),
  route({
    id: 'projects.update',
    method: 'patch',
    path: '/projects/:projectId',
    summary: 'Change name, client, description or targets',
    access: { kind: 'project', action: 'project.manage', find: findProjectTarget },
    params: projectParams,
    body: updateProjectSchema,
    answer: projectSchema,
    async handle({ app, viewer, params, body: { version, ...change } }) {
      return show(
        app,
        await updateProject(app, params.projectId, viewer.userId, version, change, 'changed the project'),
        viewer,
      );
    },
  }),
  route({
    id: 'projects.delete',
    method: 'delete',
    path: '/projects/:projectId',
    summary: 'Delete a project and all that belongs to it',
    access: { kind: 'project', action: 'project.manage', find: findProjectTarget },
    params: projectParams,
    body: deleteProjectSchema,
    answer: 'none',
    async handle({ app, params, body }) {
      await deleteProject(app, params.projectId, body.confirmName);
      return undefined;
    },
  }),
  route({
    id: 'projects.overview',
    method: 'get',
    path: '/projects/:projectId/overview',
    summary: 'Where the project stands and what waits for me',
    access: { kind: 'project', action: 'overview.read', find: findProjectTarget },
    params: projectParams,
    answer: overviewSchema,
    async handle({ app, viewer, target }) {
      const [overview, activities] = await Promise.all([
        buildOverview(app, target.project, viewer),
        listActivities(app, target.projectId, ACTIVITY_LINES),
      ]);
      return { ...overview, activity: activities.map(presentActivity) };
    },
  }),
  route({
    id: 'projects.set-study-area',
    method: 'put',
    path: '/projects/:projectId/study-area',
    summary: 'Set or remove the area that limits drawing, mapping and areas',
    access: { kind: 'project', action: 'study-area.set', find: findProjectTarget },
    params: projectParams,
    body: setStudyAreaSchema,
    answer: projectSchema,
    async handle({ app, viewer, params, body }) {
      if (body.geometry) checkStudyArea(body.geometry);
      return show(app, await setStudyArea(app, params.projectId, viewer.userId, body.version, body.geometry), viewer);
    },
  }),
];
