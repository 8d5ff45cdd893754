import type { SettleBlock } from '../../shared/contracts/block.ts';
import type { App } from '../app-context.ts';
import type { Block } from '../entities/block.ts';
import { SampleRemark } from '../entities/sample-remark.ts';
import { Sample } from '../entities/sample.ts';
import { Conflict, InvalidInput, NotFound } from '../errors.ts';
import { deleteSample, findSample } from './samples.ts';

/** Keeps one of two samples that differ in class, accepted; the other leaves the map and says why in its thread. */
export async function settleDisagreement(
  app: App,
  block: Block,
  byId: string,
  { keep, drop }: SettleBlock,
): Promise<void> {
  const isKnown = block.agreement?.disagreements.some(
    ({ firstSampleId, secondSampleId }) =>
      (firstSampleId === keep.id && secondSampleId === drop.id) ||
      (firstSampleId === drop.id && secondSampleId === keep.id),
  );
  if (!isKnown) {
    throw new InvalidInput('These two samples are no disagreement of the block.', {
      wanted: 'two samples of the two labellers that share pixels and differ in class',
    });
  }
  const [kept, dropped] = [await findSample(app, keep.id), await findSample(app, drop.id)];
  if (!kept || !dropped) throw new NotFound();
  if (kept.deletedAt || kept.version !== keep.version)
    throw new Conflict(
      'The sample to keep was changed in between.',
      { advice: 'Look at both again.' },
      'stale-version',
    );
  await deleteSample(app, dropped, byId, drop.version);
  await app.db.transaction(async (manager) => {
    const remark = { kind: 'settled' as const, byId, resolvedAt: null, resolvedById: null };
    await manager.update(Sample, { id: kept.id }, { state: 'accepted' });
    await manager.insert(SampleRemark, [
      { ...remark, sampleId: kept.id, text: `Kept; sample ${dropped.number} differed.` },
      { ...remark, sampleId: dropped.id, text: `Sample ${kept.number} was kept instead.` },
    ]);
  });
  await app.events.publish(block.projectId, { type: 'changed', what: 'samples', id: kept.id, by: byId });
}
