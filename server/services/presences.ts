import { LessThan } from 'typeorm';
import { PRESENCE_LASTS_MS } from '../../shared/contracts/presence.ts';
import type { App } from '../app-context.ts';
import { Presence } from '../entities/presence.ts';

const lastBeat = () => new Date(Date.now() - PRESENCE_LASTS_MS);

/** Open desks of a project, whoever was heard of lately, by name. */
export async function listPresences(app: App, projectId: string): Promise<Presence[]> {
  return app.db
    .getRepository(Presence)
    .createQueryBuilder('presence')
    .innerJoinAndSelect('presence.user', 'user')
    .where('presence.projectId = :projectId AND presence.seenAt > :last', { projectId, last: lastBeat() })
    .orderBy('user.name')
    .getMany();
}

/** Notes that a desk is open and what is changed at it; others hear of it only when something is new. */
export async function sayPresence(
  app: App,
  projectId: string,
  userId: string,
  { deskId, editingSampleId }: { deskId: string; editingSampleId: string | null },
): Promise<void> {
  const presences = app.db.getRepository(Presence);
  const gone = await presences.delete({ projectId, seenAt: LessThan(lastBeat()) });
  const before = await presences.findOneBy({ deskId, userId, projectId });
  await app.db.query(
    `INSERT INTO presences (deskId, projectId, userId, editingSampleId, seenAt) VALUES (?, ?, ?, ?, ?)
     ON DUPLICATE KEY UPDATE editingSampleId = IF(userId = VALUES(userId), VALUES(editingSampleId), editingSampleId),
       seenAt = IF(userId = VALUES(userId), VALUES(seenAt), seenAt)`,
    [deskId, projectId, userId, editingSampleId, new Date()],
  );
  if (!before || gone.affected || before.editingSampleId !== editingSampleId) await announce(app, projectId, userId);
}

/** Takes a desk away that was closed. */
export async function leaveDesk(app: App, projectId: string, userId: string, deskId: string): Promise<void> {
  const result = await app.db.getRepository(Presence).delete({ deskId, userId, projectId });
  if (result.affected) await announce(app, projectId, userId);
}

async function announce(app: App, projectId: string, by: string): Promise<void> {
  await app.events.publish(projectId, { type: 'changed', what: 'presence', id: null, by });
}
