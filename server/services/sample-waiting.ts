import { IsNull } from 'typeorm';
import type { Overview } from '../../shared/contracts/project.ts';
import type { App } from '../app-context.ts';
import { BlockAssignment } from '../entities/block-assignment.ts';
import { Sample } from '../entities/sample.ts';
import { can } from '../policies/policy-table.ts';
import type { Viewer } from '../policies/viewer.ts';
import { findIndependentBlocks } from './block-independence.ts';

const countOf = (n: number, noun: string) => `${n} ${noun}${n === 1 ? '' : 's'}`;

/** Samples returned to the viewer, their blocks, and what waits for the lead to review. */
export async function listWaitingSamples(app: App, projectId: string, viewer: Viewer): Promise<Overview['waiting']> {
  const waiting: Overview['waiting'] = [];
  const samples = app.db.getRepository(Sample);
  if (can('sample.draw', viewer.roles)) {
    const returned = await samples.countBy({
      ...{ projectId, createdById: viewer.userId, state: 'returned' as const },
      deletedAt: IsNull(),
    });
    if (returned > 0)
      waiting.push({ text: `Answer ${countOf(returned, 'sample')} returned to you`, path: 'samples?state=returned' });
    const blocks = await app.db.getRepository(BlockAssignment).find({
      where: { userId: viewer.userId, doneAt: IsNull(), block: { projectId } },
      relations: { block: true },
      order: { block: { number: 'ASC' } },
    });
    const [next] = blocks;
    if (next)
      waiting.push({
        text: `Draw samples in block ${next.block.name}, the next of ${blocks.length} of yours`,
        path: 'samples',
      });
  }
  if (can('sample.review', viewer.roles)) {
    const hidden = await findIndependentBlocks(app, projectId, viewer.userId);
    const submitted = await samples.find({
      where: { projectId, state: 'submitted', deletedAt: IsNull() },
      select: { id: true, blockId: true, createdById: true },
    });
    const shown = submitted.filter(
      ({ blockId, createdById }) => createdById === viewer.userId || blockId === null || !hidden.includes(blockId),
    );
    if (shown.length > 0)
      waiting.push({ text: `Review ${countOf(shown.length, 'submitted sample')}`, path: 'samples?state=submitted' });
  }
  return waiting;
}
