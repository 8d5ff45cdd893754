import type { ProjectRole } from '../../shared/constants/roles.ts';
import type { App } from '../app-context.ts';
import { Membership } from '../entities/membership.ts';
import { Project } from '../entities/project.ts';
import { Sample } from '../entities/sample.ts';
import { User } from '../entities/user.ts';
import { Conflict, NotFound } from '../errors.ts';
import type { EntityManager } from 'typeorm';
import { IsNull } from 'typeorm';
import { createAccountLink } from './account-tokens.ts';
import { createInvitedUser } from './accounts.ts';
import { recordActivity } from './activities.ts';

/** Roles of a person in a project; none when no member. */
export async function findRoles(app: App, projectId: string, userId: string): Promise<readonly ProjectRole[]> {
  const row = await app.db.getRepository(Membership).findOneBy({ projectId, userId });
  return row?.roles ?? [];
}

export interface MemberRow {
  membership: Membership;
  sampleCount: number;
}

export async function listMembers(app: App, projectId: string): Promise<MemberRow[]> {
  const memberships = await app.db.getRepository(Membership).find({ where: { projectId }, relations: { user: true } });
  const counts = await app.db
    .getRepository(Sample)
    .createQueryBuilder('sample')
    .select('sample.createdById', 'userId')
    .addSelect('COUNT(*)', 'count')
    .where({ projectId, deletedAt: IsNull() })
    .groupBy('sample.createdById')
    .getRawMany<{ userId: string | null; count: string }>();
  const countOf = new Map(counts.map((row) => [row.userId, Number(row.count)]));
  return memberships
    .map((membership) => ({ membership, sampleCount: countOf.get(membership.userId) ?? 0 }))
    .sort((a, b) => a.membership.user.name.localeCompare(b.membership.user.name));
}

async function findMember(manager: EntityManager, projectId: string, id: string): Promise<Membership> {
  const membership = await manager.findOne(Membership, { where: { id, projectId }, relations: { user: true } });
  if (!membership) throw new NotFound();
  return membership;
}

/** A project always keeps a lead: refuses a change that would leave none. */
async function keepLead(manager: EntityManager, projectId: string, leavingId: string): Promise<void> {
  const members = await manager.find(Membership, { where: { projectId }, lock: { mode: 'pessimistic_write' } });
  if (!members.some((member) => member.id !== leavingId && member.roles.includes('lead'))) {
    throw new Conflict(
      'A project needs a lead.',
      { found: 'this is its only one', advice: 'Make someone else lead first.' },
      'last-lead',
    );
  }
}

/** Adds a person by e-mail; someone without an account gets one and a welcome link. */
export async function addMember(app: App, projectId: string, byId: string, email: string, roles: ProjectRole[]) {
  const made = await app.db.transaction(async (manager) => {
    const project = await manager.findOneByOrFail(Project, { id: projectId });
    const known = await manager.findOneBy(User, { email });
    const user = known ?? (await createInvitedUser(manager, email, email.split('@')[0] ?? email));
    if (await manager.existsBy(Membership, { projectId, userId: user.id })) {
      throw new Conflict(
        'This person is in the project already.',
        { found: email, advice: 'Change their roles in the list instead.' },
        'already-member',
      );
    }
    const membership = await manager.save(
      Membership,
      manager.create(Membership, { projectId, userId: user.id, roles }),
    );
    const link = user.passwordHash === null ? await createAccountLink(app, manager, user.id, 'welcome') : null;
    await recordActivity(manager, projectId, byId, `added ${user.name} as ${roles.join(', ')}`, 'members');
    return { project, user, membership, link };
  });
  const mailed = await app.mail.send({
    to: email,
    subject: `You were added to ${made.project.name}`,
    text: `Hello ${made.user.name},\n\nyou were added to the mapping project "${made.project.name}" as ${roles.join(', ')}.\n${
      made.link
        ? `Choose a password here within 14 days:\n${made.link}`
        : `Open it here:\n${app.config.publicUrl}/projects/${projectId}`
    }\n`,
  });
  await app.events.publish(projectId, { type: 'changed', what: 'members', id: made.membership.id, by: byId });
  return {
    row: { membership: { ...made.membership, user: made.user }, sampleCount: 0 },
    mailed,
    link: mailed ? null : made.link,
  };
}

export async function updateMember(
  app: App,
  projectId: string,
  byId: string,
  id: string,
  roles: ProjectRole[],
): Promise<MemberRow> {
  await app.db.transaction(async (manager) => {
    const membership = await findMember(manager, projectId, id);
    if (membership.roles.includes('lead') && !roles.includes('lead')) await keepLead(manager, projectId, id);
    await manager.update(Membership, { id }, { roles });
    await recordActivity(manager, projectId, byId, `made ${membership.user.name} ${roles.join(', ')}`, 'members');
  });
  await app.events.publish(projectId, { type: 'changed', what: 'members', id, by: byId });
  const row = (await listMembers(app, projectId)).find(({ membership }) => membership.id === id);
  if (!row) throw new NotFound();
  return row;
}

/** Takes a person out of the project. Their samples stay, and stay credited to them. */
export async function removeMember(app: App, projectId: string, byId: string, id: string): Promise<void> {
  await app.db.transaction(async (manager) => {
    const membership = await findMember(manager, projectId, id);
    if (membership.roles.includes('lead')) await keepLead(manager, projectId, id);
    await manager.delete(Membership, { id });
    await recordActivity(manager, projectId, byId, `removed ${membership.user.name} from the project`, 'members');
  });
  await app.events.publish(projectId, { type: 'changed', what: 'members', id, by: byId });
}
