import type { EntityManager } from 'typeorm';
import type { App } from '../app-context.ts';
import { Activity } from '../entities/activity.ts';

/** Writes a line into the project's diary; `text` follows the person's name ("drew sample 12"), `path` is within the project. */
export async function recordActivity(
  manager: EntityManager,
  projectId: string,
  userId: string | null,
  text: string,
  path: string | null,
): Promise<void> {
  await manager.insert(Activity, { projectId, userId, text: text.slice(0, 400), path });
}

export function listActivities(app: App, projectId: string, limit: number): Promise<Activity[]> {
  return app.db
    .getRepository(Activity)
    .find({ where: { projectId }, relations: { user: true }, order: { id: 'DESC' }, take: limit });
}
