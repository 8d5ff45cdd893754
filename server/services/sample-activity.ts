import type { EntityManager } from 'typeorm';
import { Activity } from '../entities/activity.ts';
import { recordActivity } from './activities.ts';

const TOGETHER_MS = 15 * 60_000;
const PATH = 'samples';

/**
 * Writes what a person did with a sample into the project's diary. Samples drawn one after the other, and repeated changes of one sample,
 * share a line.
 */
export async function recordSampleActivity(
  manager: EntityManager,
  projectId: string,
  userId: string,
  verb: 'drew' | 'changed' | 'deleted' | 'restored',
  number: number,
): Promise<void> {
  const text = `${verb} sample ${number}`;
  const last = await manager.findOne(Activity, { where: { projectId }, order: { id: 'DESC' } });
  const isTogether =
    last !== null &&
    last.userId === userId &&
    last.path === PATH &&
    Date.now() - last.createdAt.getTime() < TOGETHER_MS;
  if (isTogether && last.text === text) return;
  const merged = isTogether && verb === 'drew' ? mergeDrawn(last.text, number) : null;
  if (merged && last) await manager.update(Activity, { id: last.id }, { text: merged });
  else await recordActivity(manager, projectId, userId, text, PATH);
}

/** "drew sample 3" and 4 become "drew 2 samples, 3 to 4"; null when the line says something else. */
function mergeDrawn(text: string, number: number): string | null {
  const single = /^drew sample (\d+)$/.exec(text);
  const several = /^drew (\d+) samples, (\d+) to \d+$/.exec(text);
  if (single) return `drew 2 samples, ${single[1]} to ${number}`;
  if (several) return `drew ${Number(several[1]) + 1} samples, ${several[2]} to ${number}`;
  return null;
}
