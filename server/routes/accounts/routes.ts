import { z } from 'zod';
import {
  accountLinkSchema,
  createAccountSchema,
  siteAccountListSchema,
  siteAccountSchema,
  siteStorageSchema,
  updateAccountSchema,
} from '../../../shared/contracts/account.ts';
import { idSchema } from '../../../shared/contracts/common.ts';
import { presentSiteAccount } from '../../presenters/present-account.ts';
import { listAccounts, updateAccount } from '../../services/accounts.ts';
import { inviteAccount, resendAccountLink } from '../../services/site-accounts.ts';
import { measureStorage } from '../../services/site-storage.ts';
import { route } from '../route.ts';

const accountParams = z.object({ accountId: idSchema });

export const accountRoutes = [
  route({
    id: 'site.accounts.list',
    method: 'get',
    path: '/site/accounts',
    summary: 'All accounts of this site',
    access: { kind: 'site-admin' },
    answer: siteAccountListSchema,
    async handle({ app }) {
      return { accounts: (await listAccounts(app)).map(presentSiteAccount) };
    },
  }),
  route({
    id: 'site.accounts.create',
    method: 'post',
    path: '/site/accounts',
    summary: 'Make an account and mail its welcome link',
    access: { kind: 'site-admin' },
    body: createAccountSchema,
    answer: accountLinkSchema,
    status: 201,
    async handle({ app, body }) {
      const { user, mailed, link } = await inviteAccount(app, body);
      return { account: presentSiteAccount({ user, projectCount: 0 }), mailed, link };
    },
  }),
  route({
    id: 'site.accounts.update',
    method: 'patch',
    path: '/site/accounts/:accountId',
    summary: 'Close, reopen, or make site administrator',
    access: { kind: 'site-admin' },
    params: accountParams,
    body: updateAccountSchema,
    answer: siteAccountSchema,
    async handle({ app, params, body }) {
      const user = await updateAccount(app, params.accountId, body);
      const row = (await listAccounts(app)).find((entry) => entry.user.id === user.id);
      return presentSiteAccount({ user, projectCount: row?.projectCount ?? 0 });
    },
  }),
  route({
    id: 'site.accounts.link',
    method: 'post',
    path: '/site/accounts/:accountId/link',
    summary: 'Send a new welcome or reset link',
    access: { kind: 'site-admin' },
    params: accountParams,
    answer: accountLinkSchema,
    async handle({ app, params }) {
      const { user, mailed, link } = await resendAccountLink(app, params.accountId);
      const row = (await listAccounts(app)).find((entry) => entry.user.id === user.id);
      return { account: presentSiteAccount({ user, projectCount: row?.projectCount ?? 0 }), mailed, link };
    },
  }),
  route({
    id: 'site.storage.read',
    method: 'get',
    path: '/site/storage',
    summary: 'What the stored files take',
    access: { kind: 'site-admin' },
    answer: siteStorageSchema,
    handle: ({ app }) => measureStorage(app),
  }),
];
