import type { EntityManager } from 'typeorm';
import type { App } from '../app-context.ts';
import { SampleRemark } from '../entities/sample-remark.ts';
import type { Sample } from '../entities/sample.ts';
import { InvalidInput } from '../errors.ts';

/** A sample's thread, oldest first. */
export function listRemarks(app: App, sampleId: string): Promise<SampleRemark[]> {
  return app.db.getRepository(SampleRemark).find({
    where: { sampleId },
    relations: { by: true, resolvedBy: true },
    order: { createdAt: 'ASC' },
  });
}

/** A remark with its sample. */
export function findRemark(app: App, id: string): Promise<SampleRemark | null> {
  return app.db.getRepository(SampleRemark).findOne({ where: { id }, relations: { sample: true } });
}

/** Counts anew what is open on samples: comments and returns nobody has resolved. */
export async function countOpenRemarks(manager: EntityManager, sampleIds: readonly string[]): Promise<void> {
  await manager.query(
    `UPDATE samples s SET s.openRemarks = (
       SELECT COUNT(*) FROM sample_remarks r
       WHERE r.sampleId = s.id AND r.resolvedAt IS NULL AND r.kind IN ('comment', 'returned'))
     WHERE s.id IN (?)`,
    [sampleIds],
  );
}

export async function addRemark(app: App, sample: Sample, byId: string, text: string): Promise<void> {
  await app.db.transaction(async (manager) => {
    const content = { sampleId: sample.id, kind: 'comment' as const, text, byId, resolvedAt: null, resolvedById: null };
    await manager.insert(SampleRemark, content);
    await countOpenRemarks(manager, [sample.id]);
  });
  await announce(app, sample, byId);
}

/** Marks a remark as dealt with, or as open again. @throws InvalidInput for a step of the review, which is no question */
export async function resolveRemark(app: App, remark: SampleRemark, byId: string, isResolved: boolean): Promise<void> {
  if (remark.kind !== 'comment' && remark.kind !== 'returned') {
    throw new InvalidInput('Only a comment can be resolved.', { found: remark.kind, wanted: 'a comment' });
  }
  await app.db.transaction(async (manager) => {
    const change = isResolved
      ? { resolvedAt: new Date(), resolvedById: byId }
      : { resolvedAt: null, resolvedById: null };
    await manager.update(SampleRemark, { id: remark.id }, change);
    await countOpenRemarks(manager, [remark.sampleId]);
  });
  await announce(app, remark.sample, byId);
}

async function announce(app: App, { projectId, id }: Sample, by: string): Promise<void> {
  await app.events.publish(projectId, { type: 'changed', what: 'samples', id, by });
}
