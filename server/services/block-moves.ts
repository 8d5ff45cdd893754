import type { BlockMove } from '../../shared/contracts/block.ts';
import type { App } from '../app-context.ts';
import { BlockAssignment } from '../entities/block-assignment.ts';
import { Block } from '../entities/block.ts';
import { Conflict, NotAllowed } from '../errors.ts';
import { can } from '../policies/policy-table.ts';
import type { Viewer } from '../policies/viewer.ts';
import { recordActivity } from './activities.ts';
import { measureAgreement } from './block-agreement.ts';
import { announceBlocks } from './blocks.ts';

/**
 * Says that one is done with a block, takes that back, or checks it. When the second of two is done, what each drew is shown
 * to the other, and their agreement is kept as it is then; from then on only the lead may open the block again.
 */
export async function moveBlock(app: App, block: Block, viewer: Viewer, to: BlockMove): Promise<void> {
  const isLead = can('block.manage', viewer.roles);
  await app.db.transaction(async (manager) => {
    // Two who are done at once wait for each other here, so that one of them is the second.
    const now = await manager.findOneOrFail(Block, { where: { id: block.id }, lock: { mode: 'pessimistic_write' } });
    const parts = await manager.find(BlockAssignment, { where: { blockId: block.id } });
    const mine = parts.find(({ userId }) => userId === viewer.userId);
    const areAllDone = parts.length > 0 && parts.every(({ doneAt }) => doneAt);
    if (to === 'checked' || to === 'unchecked') {
      if (!isLead) throw new NotAllowed('The lead checks blocks.');
      if (to === 'checked' && !areAllDone)
        throw new Conflict(
          'The block is not done yet.',
          { advice: 'Wait until all who work in it say so.' },
          'not-done',
        );
      await manager.update(Block, { id: now.id }, { checkedAt: to === 'checked' ? new Date() : null });
    } else if (to === 'done') {
      if (!mine) throw new NotAllowed('The block is not one of yours.');
      if (!mine.doneAt) {
        await manager.update(BlockAssignment, { blockId: now.id, userId: viewer.userId }, { doneAt: new Date() });
        const isLast = parts.length === 2 && parts.every((one) => one === mine || one.doneAt);
        if (isLast)
          await manager.update(Block, { id: now.id }, { agreement: await measureAgreement(app, manager, now) });
      }
    } else {
      if (!mine && !isLead) throw new NotAllowed('The block is not one of yours.');
      if (!isLead && (now.checkedAt || (parts.length > 1 && areAllDone))) {
        throw new Conflict(
          now.checkedAt ? 'The lead has checked the block.' : 'Both of you are done: the agreement stands.',
          { advice: 'Ask the lead to open it again.' },
          'closed',
        );
      }
      await manager.update(BlockAssignment, isLead ? { blockId: now.id } : { blockId: now.id, userId: viewer.userId }, {
        doneAt: null,
      });
      await manager.update(Block, { id: now.id }, { checkedAt: null, agreement: null });
    }
    await recordActivity(manager, now.projectId, viewer.userId, SAID[to](now.name), 'samples/blocks');
  });
  await announceBlocks(app, block.projectId, block.id, viewer.userId);
}

const SAID: Record<BlockMove, (name: string) => string> = {
  done: (name) => `is done with block ${name}`,
  'in-work': (name) => `opened block ${name} again`,
  checked: (name) => `checked block ${name}`,
  unchecked: (name) => `took the check of block ${name} back`,
};
