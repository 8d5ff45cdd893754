import type { App } from '../app-context.ts';
import { User } from '../entities/user.ts';
import { createAccountLink } from './account-tokens.ts';
import { createInvitedUser } from './accounts.ts';

/** Whether nobody has an account yet. */
export async function isSiteEmpty(app: App): Promise<boolean> {
  return (await app.db.getRepository(User).count()) === 0;
}

/** On an empty site: makes the first administrator and gives lines that tell the operator how to get in. */
export async function inviteFirstAdmin(app: App): Promise<string[]> {
  const { adminEmail } = app.config;
  if (adminEmail === null) {
    if (app.config.demo) return [];
    const waiting = await app.db.getRepository(User).countBy({ siteAdmin: true });
    return waiting > 0
      ? []
      : ['Nobody has an account yet: set GROUNDSEL_ADMIN_EMAIL to the first administrator’s e-mail and start again.'];
  }
  const known = await app.db.getRepository(User).findOneBy({ email: adminEmail });
  if (known?.passwordHash || (!known && !(await isSiteEmpty(app)))) return [];
  const link = await app.db.transaction(async (manager) => {
    const user = known ?? (await createInvitedUser(manager, adminEmail, 'Site administrator', true));
    return createAccountLink(app, manager, user.id, 'welcome');
  });
  return [`Choose the password of ${adminEmail} here: ${link}`];
}
