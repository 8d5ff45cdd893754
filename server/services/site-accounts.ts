import type { App } from '../app-context.ts';
import { User } from '../entities/user.ts';
import { NotFound } from '../errors.ts';
import { createAccountLink } from './account-tokens.ts';
import { createInvitedUser } from './accounts.ts';

export interface AccountLink {
  user: User;
  mailed: boolean;
  /** Given only when no letter left. */
  link: string | null;
}

/** Makes an account without a password and mails its welcome link. */
export async function inviteAccount(
  app: App,
  input: { email: string; name: string; siteAdmin: boolean },
): Promise<AccountLink> {
  const { user, link } = await app.db.transaction(async (manager) => {
    const user = await createInvitedUser(manager, input.email, input.name, input.siteAdmin);
    return { user, link: await createAccountLink(app, manager, user.id, 'welcome') };
  });
  return mailLink(app, user, link, 'welcome');
}

/** Sends a welcome link to someone without a password, a reset link to anyone else. */
export async function resendAccountLink(app: App, userId: string): Promise<AccountLink> {
  const user = await app.db.getRepository(User).findOneBy({ id: userId });
  if (!user) throw new NotFound();
  const purpose = user.passwordHash === null ? 'welcome' : 'reset';
  return mailLink(app, user, await createAccountLink(app, app.db.manager, userId, purpose), purpose);
}

async function mailLink(app: App, user: User, link: string, purpose: 'welcome' | 'reset'): Promise<AccountLink> {
  const mailed = await app.mail.send({
    to: user.email,
    subject: purpose === 'welcome' ? 'Welcome to Groundsel' : 'Choose a new Groundsel password',
    text: `Hello ${user.name},\n\nchoose your password here within ${purpose === 'welcome' ? '14 days' : 'two hours'}:\n${link}\n`,
  });
  return { user, mailed, link: mailed ? null : link };
}
