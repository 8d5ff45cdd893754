import { createHash, randomBytes } from 'node:crypto';
import { IsNull, MoreThan, type EntityManager } from 'typeorm';
import type { App } from '../app-context.ts';
import { AccountToken } from '../entities/account-token.ts';
import { Session } from '../entities/session.ts';
import { User } from '../entities/user.ts';
import { NotFound } from '../errors.ts';
import { hashPassword } from './accounts.ts';

const LIFETIME_HOURS = { welcome: 24 * 14, reset: 2 };

function digest(secret: string): string {
  return createHash('sha256').update(secret).digest('hex');
}

/** Makes a link that lets its holder choose a password; older links for the same purpose stop working. */
export async function createAccountLink(
  app: App,
  manager: EntityManager,
  userId: string,
  purpose: 'welcome' | 'reset',
): Promise<string> {
  const secret = randomBytes(32).toString('base64url');
  await manager.delete(AccountToken, { userId, purpose });
  await manager.insert(AccountToken, {
    secretSha256: digest(secret),
    userId,
    purpose,
    expiresAt: new Date(Date.now() + LIFETIME_HOURS[purpose] * 3_600_000),
  });
  return `${app.config.publicUrl}/welcome/${secret}`;
}

function refuseLink(): NotFound {
  return new NotFound('This link is wrong, was used already, or is too old. Ask for a new one.');
}

/** The token behind a link. @throws NotFound when it is wrong, used or too old */
export async function findAccountToken(app: App, secret: string): Promise<AccountToken> {
  const token = await app.db.getRepository(AccountToken).findOne({
    where: { secretSha256: digest(secret), expiresAt: MoreThan(new Date()), user: { closedAt: IsNull() } },
    relations: { user: true },
  });
  if (!token) throw refuseLink();
  return token;
}

/** Sets name and password through a link, ends all sessions of the account, and uses the link up. */
export async function acceptAccountLink(app: App, secret: string, name: string, password: string): Promise<User> {
  const token = await findAccountToken(app, secret);
  const passwordHash = await hashPassword(password);
  await app.db.transaction(async (manager) => {
    // By its digest first: of two that hold the same link at once, one is too late.
    const used = await manager.delete(AccountToken, { secretSha256: token.secretSha256 });
    if (!used.affected) throw refuseLink();
    await manager.delete(AccountToken, { userId: token.userId });
    await manager.update(User, { id: token.userId }, { name, passwordHash });
    await manager.delete(Session, { userId: token.userId });
  });
  return app.db.getRepository(User).findOneByOrFail({ id: token.userId });
}

/** Mails a reset link if the account exists; says nothing either way, so that no one can ask who has an account. */
export async function requestPasswordReset(app: App, email: string): Promise<void> {
  const user = await app.db.getRepository(User).findOneBy({ email, closedAt: IsNull() });
  if (!user) return;
  const link = await createAccountLink(app, app.db.manager, user.id, 'reset');
  // Not waited for: how long a mail server takes would tell that there is an account. A failure is logged by the mailer.
  void app.mail.send({
    to: user.email,
    subject: 'Choose a new Groundsel password',
    text: `Hello ${user.name},\n\nchoose a new password here within two hours:\n${link}\n\nIf you did not ask for this, do nothing; your password stays as it is.\n`,
  });
}
