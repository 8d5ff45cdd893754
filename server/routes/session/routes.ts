import { z } from 'zod';
import {
  acceptWelcomeSchema,
  accountSchema,
  changeAccountSchema,
  changePasswordSchema,
  deviceListSchema,
  forgotPasswordSchema,
  sessionSchema,
  signInSchema,
  welcomeSchema,
} from '../../../shared/contracts/account.ts';
import { emptySchema } from '../../../shared/contracts/common.ts';
import { NotFound, NotSignedIn } from '../../errors.ts';
import { presentAccount } from '../../presenters/present-account.ts';
import { acceptAccountLink, findAccountToken, requestPasswordReset } from '../../services/account-tokens.ts';
import {
  changeAccount,
  changePassword,
  endAllSessions,
  findOpenUser,
  listDevices,
  verifyPassword,
} from '../../services/accounts.ts';
import { route } from '../route.ts';
import { closeSession, openSession } from './sign-in.ts';
import { linkThrottle, passwordThrottle, resetThrottle, signInThrottle } from './throttle.ts';

const secretParams = z.object({ secret: z.string().min(20).max(100) });

export const sessionRoutes = [
  route({
    id: 'session.read',
    method: 'get',
    path: '/session',
    summary: 'Who is signed in in this browser',
    access: { kind: 'public' },
    answer: sessionSchema,
    async handle({ app, req }) {
      const user = req.user ? await findOpenUser(app, req.user.id) : null;
      return { account: user ? presentAccount(user) : null };
    },
  }),
  route({
    id: 'session.create',
    method: 'post',
    path: '/session',
    summary: 'Sign in with e-mail and password',
    access: { kind: 'public' },
    body: signInSchema,
    answer: sessionSchema,
    before: signInThrottle,
    async handle({ app, req, body }) {
      const user = await verifyPassword(app, body.email, body.password);
      if (!user) throw new NotSignedIn('E-mail and password do not belong together.');
      await openSession(req, user);
      return { account: presentAccount(user) };
    },
  }),
  route({
    id: 'session.delete',
    method: 'delete',
    path: '/session',
    summary: 'Sign out in this browser',
    access: { kind: 'account' },
    answer: 'none',
    async handle({ req, res }) {
      await closeSession(req);
      res.clearCookie('groundsel.sid');
      return undefined;
    },
  }),
  route({
    id: 'session.devices',
    method: 'get',
    path: '/account/devices',
    summary: 'Browsers signed in to my account',
    access: { kind: 'account' },
    answer: deviceListSchema,
    async handle({ app, viewer, req }) {
      const rows = await listDevices(app, viewer.userId);
      const devices = rows.map((row) => ({
        id: row.id.slice(0, 8),
        userAgent: row.userAgent,
        address: row.address,
        lastSeenAt: row.lastSeenAt.toISOString(),
        current: row.id === req.sessionID,
      }));
      return { devices };
    },
  }),
  route({
    id: 'session.delete-all',
    method: 'delete',
    path: '/account/devices',
    summary: 'Sign out everywhere, here too',
    access: { kind: 'account' },
    answer: 'none',
    async handle({ app, viewer, req, res }) {
      await endAllSessions(app, viewer.userId);
      await closeSession(req);
      res.clearCookie('groundsel.sid');
      return undefined;
    },
  }),
  route({
    id: 'account.change',
    method: 'patch',
    path: '/account',
    summary: 'Change my name, or whether I am mailed when my runs end',
    access: { kind: 'account' },
    body: changeAccountSchema,
    answer: accountSchema,
    async handle({ app, viewer, body }) {
      return presentAccount(await changeAccount(app, viewer.userId, body));
    },
  }),
  route({
    id: 'account.change-password',
    method: 'put',
    path: '/account/password',
    summary: 'Change my password; other browsers are signed out',
    access: { kind: 'account' },
    body: changePasswordSchema,
    answer: 'none',
    before: passwordThrottle,
    async handle({ app, viewer, body, req }) {
      await changePassword(app, viewer.userId, body.current, body.next, req.sessionID);
      return undefined;
    },
  }),
  route({
    id: 'account.forgot-password',
    method: 'post',
    path: '/account/forgotten',
    summary: 'Ask for a link to choose a new password; the answer is the same whether the account exists',
    access: { kind: 'public' },
    body: forgotPasswordSchema,
    answer: emptySchema,
    status: 202,
    before: resetThrottle,
    async handle({ app, body }) {
      await requestPasswordReset(app, body.email);
      return {};
    },
  }),
  route({
    id: 'welcome.read',
    method: 'get',
    path: '/welcome/:secret',
    summary: 'Whom a welcome or reset link is for',
    access: { kind: 'public' },
    params: secretParams,
    answer: welcomeSchema,
    before: linkThrottle,
    async handle({ app, params }) {
      const token = await findAccountToken(app, params.secret);
      return { email: token.user.email, name: token.user.name, purpose: token.purpose };
    },
  }),
  route({
    id: 'welcome.accept',
    method: 'post',
    path: '/welcome/:secret',
    summary: 'Choose name and password through a link, and sign in',
    access: { kind: 'public' },
    params: secretParams,
    body: acceptWelcomeSchema,
    answer: sessionSchema,
    before: linkThrottle,
    async handle({ app, params, body, req }) {
      const user = await acceptAccountLink(app, params.secret, body.name, body.password);
      const open = await findOpenUser(app, user.id);
      if (!open) throw new NotFound();
      await openSession(req, open);
      return { account: presentAccount(open) };
    },
  }),
];
