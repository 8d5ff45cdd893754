import { hash, verify } from '@node-rs/argon2';
import { IsNull, MoreThan, Not, type EntityManager } from 'typeorm';
import type { App } from '../app-context.ts';
import { AccountToken } from '../entities/account-token.ts';
import { Membership } from '../entities/membership.ts';
import { Session } from '../entities/session.ts';
import { User } from '../entities/user.ts';
import { Conflict, InvalidInput, NotFound } from '../errors.ts';

/** Argon2id; memory, passes and lanes as recommended by RFC 9106 for memory-constrained hosts, with fewer lanes for two cores. */
const ARGON2 = { memoryCost: 65_536, timeCost: 3, parallelism: 2 };

export function hashPassword(password: string): Promise<string> {
  return hash(password, ARGON2);
}

let decoyHash: Promise<string> | null = null;

/** The account with this e-mail and password, or null; takes as long for an unknown e-mail as for a wrong password. */
export async function verifyPassword(app: App, email: string, password: string): Promise<User | null> {
  const user = await app.db.getRepository(User).findOneBy({ email, closedAt: IsNull() });
  decoyHash ??= hashPassword('no account has this password');
  const right = await verify(user?.passwordHash ?? (await decoyHash), password);
  return user?.passwordHash && right ? user : null;
}

export function findOpenUser(app: App, id: string): Promise<User | null> {
  return app.db.getRepository(User).findOneBy({ id, closedAt: IsNull() });
}

/** Changes the password and signs out every other browser. @throws InvalidInput when the present one is wrong */
export async function changePassword(
  app: App,
  userId: string,
  current: string,
  next: string,
  keepSessionId: string,
): Promise<void> {
  const user = await app.db.getRepository(User).findOneByOrFail({ id: userId });
  if (!user.passwordHash || !(await verify(user.passwordHash, current))) {
    throw new InvalidInput('The present password is not right.', {
      errors: [{ path: 'current', message: 'This is not your present password.' }],
    });
  }
  const passwordHash = await hashPassword(next);
  await app.db.transaction(async (manager) => {
    await manager.update(User, { id: userId }, { passwordHash });
    // A reset link that someone else asked for must not undo the change.
    await manager.delete(AccountToken, { userId });
    await manager.delete(Session, { userId, id: Not(keepSessionId) });
  });
  await app.mail.send({
    to: user.email,
    subject: 'Your Groundsel password was changed',
    text: `Hello ${user.name},\n\nyour password was just changed, and other browsers were signed out.\nIf this was not you, ask your site administrator for a reset link at once.\n`,
  });
}

export async function changeAccount(
  app: App,
  userId: string,
  { name, mailsRunEnd }: { name?: string; mailsRunEnd?: boolean },
): Promise<User> {
  await app.db
    .getRepository(User)
    .update(
      { id: userId },
      { ...(name === undefined ? {} : { name }), ...(mailsRunEnd === undefined ? {} : { mailsRunEnd }) },
    );
  return app.db.getRepository(User).findOneByOrFail({ id: userId });
}

export function listDevices(app: App, userId: string): Promise<Session[]> {
  return app.db
    .getRepository(Session)
    .find({ where: { userId, expiresAt: MoreThan(new Date()) }, order: { lastSeenAt: 'DESC' } });
}

/** Signs the account out in every browser, this one too. */
export async function endAllSessions(app: App, userId: string): Promise<void> {
  await app.db.getRepository(Session).delete({ userId });
}

export interface SiteAccountRow {
  user: User;
  projectCount: number;
}

export async function listAccounts(app: App): Promise<SiteAccountRow[]> {
  const users = await app.db.getRepository(User).find({ order: { email: 'ASC' } });
  const memberships = await app.db.getRepository(Membership).find({ select: { userId: true } });
  return users.map((user) => ({ user, projectCount: memberships.filter((row) => row.userId === user.id).length }));
}

/** Makes an account that has no password yet. @throws Conflict when the e-mail is taken */
export async function createInvitedUser(
  manager: EntityManager,
  email: string,
  name: string,
  siteAdmin = false,
): Promise<User> {
  if (await manager.existsBy(User, { email })) {
    throw new Conflict('There is an account with this e-mail already.', { found: email }, 'email-taken');
  }
  return manager.save(User, manager.create(User, { email, name, siteAdmin, passwordHash: null, closedAt: null }));
}

/** Opens or closes an account, or makes it a site administrator. The last open administrator stays one. */
export async function updateAccount(
  app: App,
  id: string,
  change: { siteAdmin?: boolean; closed?: boolean },
): Promise<User> {
  return app.db.transaction(async (manager) => {
    const user = await manager.findOneBy(User, { id });
    if (!user) throw new NotFound();
    const stays = (change.siteAdmin ?? user.siteAdmin) && !(change.closed ?? user.closedAt !== null);
    if (user.siteAdmin && !stays) {
      const others = await manager.find(User, {
        where: { siteAdmin: true, closedAt: IsNull(), id: Not(id) },
        lock: { mode: 'pessimistic_write' },
      });
      if (others.length === 0) {
        throw new Conflict(
          'This is the last site administrator.',
          { advice: 'Make someone else site administrator first.' },
          'last-admin',
        );
      }
    }
    if (change.siteAdmin !== undefined) user.siteAdmin = change.siteAdmin;
    if (change.closed !== undefined) user.closedAt = change.closed ? (user.closedAt ?? new Date()) : null;
    if (user.closedAt) await manager.delete(Session, { userId: id });
    return manager.save(user);
  });
}
