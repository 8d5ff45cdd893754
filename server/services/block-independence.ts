import type { App } from '../app-context.ts';
import { NotFound } from '../errors.ts';

/**
 * Blocks the person shares with another, who label them independently of each other: until both are done, each sees only
 * their own samples there.
 */
export async function findIndependentBlocks(app: App, projectId: string, userId: string): Promise<string[]> {
  const rows = await app.db.query<{ blockId: string }[]>(
    `SELECT a.blockId FROM block_assignments a JOIN blocks b ON b.id = a.blockId
     WHERE b.projectId = ? GROUP BY a.blockId
     HAVING COUNT(*) > 1 AND SUM(a.userId = ?) > 0 AND SUM(a.doneAt IS NULL) > 0`,
    [projectId, userId],
  );
  return rows.map(({ blockId }) => blockId);
}

interface PlacedSample {
  projectId: string;
  blockId: string | null;
  createdById: string | null;
}

export async function isWithheld(app: App, sample: PlacedSample, userId: string): Promise<boolean> {
  if (sample.blockId === null || sample.createdById === userId) return false;
  return (await findIndependentBlocks(app, sample.projectId, userId)).includes(sample.blockId);
}

/** @throws NotFound for a sample that is withheld from the person: to them it is not there */
export async function requireShown(app: App, sample: PlacedSample, userId: string): Promise<void> {
  if (await isWithheld(app, sample, userId)) throw new NotFound();
}
