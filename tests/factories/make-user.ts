import type { App } from '../../server/app-context.ts';
import { User } from '../../server/entities/user.ts';
import { hashPassword } from '../../server/services/accounts.ts';

/** Every made user's password. */
export const PASSWORD = 'a password for tests';

// Argon2 is slow on purpose, so one hash serves all users of a test file.
let sharedHash: Promise<string> | null = null;
let made = 0;

export async function makeUser(app: App, overrides: Partial<User> = {}): Promise<User> {
  made++;
  sharedHash ??= hashPassword(PASSWORD);
  const users = app.db.getRepository(User);
  return users.save(
    users.create({
      email: `person-${made}@vennory.example`,
      name: `Person ${made}`,
      passwordHash: await sharedHash,
      siteAdmin: false,
      closedAt: null,
      ...overrides,
    }),
  );
}
