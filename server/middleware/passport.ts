import passport from 'passport';
import { Strategy as LocalStrategy } from 'passport-local';
import type { App } from '../app-context.ts';
import { findOpenUser, verifyPassword } from '../services/accounts.ts';

/** The signed-in account as `req.user`. */
export interface SignedInUser {
  id: string;
  name: string;
  email: string;
  siteAdmin: boolean;
}

declare global {
  // eslint's no-namespace has no other way: Express types are merged by namespace.
  namespace Express {
    interface User extends SignedInUser {
      id: string;
    }
  }
}

/** Passport with e-mail and password; sessions hold only the account's id. */
export function createPassport(app: App): passport.Authenticator {
  const instance = new passport.Passport();
  instance.use(
    new LocalStrategy({ usernameField: 'email', passwordField: 'password' }, (email, password, done) => {
      verifyPassword(app, email, password)
        .then((user) => done(null, user ?? false))
        .catch(done);
    }),
  );
  instance.serializeUser<string>((user, done) => done(null, user.id));
  instance.deserializeUser<string>((id, done) => {
    findOpenUser(app, id)
      .then((user) => done(null, user ?? false))
      .catch(done);
  });
  return instance;
}
