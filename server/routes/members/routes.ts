import { idSchema } from '../../../shared/contracts/common.ts';
import {
  addMemberResultSchema,
  addMemberSchema,
  memberListSchema,
  memberSchema,
  updateMemberSchema,
} from '../../../shared/contracts/project.ts';
import { presentMember } from '../../presenters/present-project.ts';
import { addMember, listMembers, removeMember, updateMember } from '../../services/memberships.ts';
import { findProjectTarget, projectParams } from '../find-project.ts';
import { route } from '../route.ts';

const memberParams = projectParams.extend({ memberId: idSchema });
const manage = { kind: 'project', action: 'member.manage', find: findProjectTarget } as const;

export const memberRoutes = [
  route({
    id: 'members.list',
    method: 'get',
    path: '/projects/:projectId/members',
    summary: 'People in the project',
    access: { kind: 'project', action: 'member.read', find: findProjectTarget },
    params: projectParams,
    answer: memberListSchema,
    async handle({ app, params }) {
      return { members: (await listMembers(app, params.projectId)).map(presentMember) };
    },
  }),
  route({
    id: 'members.add',
    method: 'post',
    path: '/projects/:projectId/members',
    summary: 'Add a person by e-mail',
    access: manage,
    params: projectParams,
    body: addMemberSchema,
    answer: addMemberResultSchema,
    status: 201,
    async handle({ app, viewer, params, body }) {
      const { row, mailed, link } = await addMember(app, params.projectId, viewer.userId, body.email, body.roles);
      return { member: presentMember(row), mailed, link };
    },
  }),
  route({
    id: 'members.update',
    method: 'patch',
    path: '/projects/:projectId/members/:memberId',
    summary: 'Change a person’s roles',
    access: manage,
    params: memberParams,
    body: updateMemberSchema,
    answer: memberSchema,
    async handle({ app, viewer, params, body }) {
      return presentMember(await updateMember(app, params.projectId, viewer.userId, params.memberId, body.roles));
    },
  }),
  route({
    id: 'members.remove',
    method: 'delete',
    path: '/projects/:projectId/members/:memberId',
    summary: 'Take a person out of the project; their samples stay',
    access: manage,
    params: memberParams,
    answer: 'none',
    async handle({ app, viewer, params }) {
      await removeMember(app, params.projectId, viewer.userId, params.memberId);
      return undefined;
    },
  }),
];
