import { useMutation, useQueryClient } from '@tanstack/react-query';
import type { z } from 'zod';
import { accountLinkSchema, type createAccountSchema } from '../../../../shared/contracts/account.ts';
import { fetchJson } from '../../lib/fetch-json.ts';
import { siteAccountListQuery } from './list-site-accounts.ts';

export type NewAccount = z.input<typeof createAccountSchema>;
export type AccountLink = z.infer<typeof accountLinkSchema>;

const createSiteAccount = (body: NewAccount) =>
  fetchJson('/site/accounts', accountLinkSchema, { method: 'POST', body });

/** Makes an account; the answer carries its welcome link when no letter could be sent. */
export function useCreateSiteAccount() {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: createSiteAccount,
    onSuccess: () => queryClient.invalidateQueries({ queryKey: siteAccountListQuery().queryKey }),
  });
}
