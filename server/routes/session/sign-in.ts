import type { Request } from 'express';
import type { SignedInUser } from '../../middleware/passport.ts';

/** Opens a fresh session for the account; passport changes the session id, so a planted one is worth nothing. */
export async function openSession(req: Request, user: SignedInUser): Promise<void> {
  await new Promise<void>((resolve, reject) => {
    req.logIn(user, (error?: unknown) => (error ? reject(error as Error) : resolve()));
  });
  req.session.userAgent = req.get('user-agent') ?? '';
  req.session.address = req.ip ?? '';
}

/** Ends the session of this browser. */
export async function closeSession(req: Request): Promise<void> {
  await new Promise<void>((resolve, reject) => {
    req.session.destroy((error?: unknown) => (error ? reject(error as Error) : resolve()));
  });
}
