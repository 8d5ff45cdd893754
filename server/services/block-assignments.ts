import { In } from 'typeorm';
import type { AssignBlocks } from '../../shared/contracts/block.ts';
import type { App } from '../app-context.ts';
import { BlockAssignment } from '../entities/block-assignment.ts';
import { Block } from '../entities/block.ts';
import { Membership } from '../entities/membership.ts';
import type { Project } from '../entities/project.ts';
import { InvalidInput } from '../errors.ts';
import { can } from '../policies/policy-table.ts';
import type { Viewer } from '../policies/viewer.ts';
import { recordActivity } from './activities.ts';
import { announceBlocks } from './blocks.ts';

/** Gives blocks to people who draw samples; whoever had one before keeps their samples. One letter for each who is new to any. */
export async function assignBlocks(app: App, project: Project, viewer: Viewer, input: AssignBlocks): Promise<void> {
  const userIds = [...new Set(input.userIds)];
  const members = await app.db
    .getRepository(Membership)
    .find({ where: { projectId: project.id, userId: In(userIds) }, relations: { user: true } });
  const able = members.filter(({ roles }) => can('sample.draw', roles));
  if (able.length < userIds.length) {
    throw new InvalidInput('A block is given to people who draw samples here.', {
      errors: [{ path: 'userIds', message: 'Choose labellers of this project.' }],
    });
  }
  const blocks = await app.db.getRepository(Block).findBy({ projectId: project.id, id: In(input.blockIds) });
  if (blocks.length < new Set(input.blockIds).size) {
    throw new InvalidInput('One of the blocks is not there any more.', {
      errors: [{ path: 'blockIds', message: 'Choose blocks of this project.' }],
    });
  }
  const ids = blocks.map(({ id }) => id);
  const gained = await app.db.transaction(async (manager) => {
    const before = await manager.find(BlockAssignment, { where: { blockId: In(ids) } });
    const had = new Set(before.map(({ blockId, userId }) => `${blockId} ${userId}`));
    const gone = before.filter(({ userId }) => !userIds.includes(userId));
    for (const { blockId, userId } of gone) await manager.delete(BlockAssignment, { blockId, userId });
    const added = ids.flatMap((blockId) =>
      userIds.filter((userId) => !had.has(`${blockId} ${userId}`)).map((userId) => ({ blockId, userId, doneAt: null })),
    );
    if (added.length > 0) await manager.insert(BlockAssignment, added);
    const changed = new Set([...gone, ...added].map(({ blockId }) => blockId));
    if (changed.size > 0) await manager.update(Block, { id: In([...changed]) }, { checkedAt: null, agreement: null });
    if (input.targetPerClass !== undefined)
      await manager.update(Block, { id: In(ids) }, { targetPerClass: input.targetPerClass });
    await recordActivity(manager, project.id, viewer.userId, describe(blocks, able), 'samples/blocks');
    return added;
  });
  await announceBlocks(app, project.id, ids.length === 1 ? (ids[0] ?? null) : null, viewer.userId);
  if (!app.mail.sends) return;
  for (const { userId, user } of able) {
    const names = blocks.filter(({ id }) => gained.some((one) => one.userId === userId && one.blockId === id));
    if (names.length === 0 || userId === viewer.userId || user.closedAt) continue;
    const which = names.length === 1 ? `Block ${names[0]?.name}` : `${names.length} blocks`;
    await app.mail.send({
      to: user.email,
      subject: `${which} for you – ${project.name}`,
      text: `Hello ${user.name},\n\n${viewer.name} gave you ${names.length === 1 ? 'block' : 'the blocks'} ${names
        .map(({ name }) => name)
        .join(', ')} of ${project.name}.\n\n${app.config.publicUrl}/projects/${project.id}/samples\n`,
    });
  }
}

function describe(blocks: readonly Block[], members: readonly Membership[]): string {
  const what = blocks.length === 1 ? `block ${blocks[0]?.name}` : `${blocks.length} blocks`;
  return members.length === 0
    ? `gave ${what} to nobody`
    : `gave ${what} to ${members.map(({ user }) => user.name).join(' and ')}`;
}
