import { useMutation, useQueryClient } from '@tanstack/react-query';
import type { z } from 'zod';
import { siteAccountSchema, type updateAccountSchema } from '../../../../shared/contracts/account.ts';
import { fetchJson } from '../../lib/fetch-json.ts';
import { siteAccountListQuery } from './list-site-accounts.ts';

type AccountChange = z.infer<typeof updateAccountSchema>;

function updateSiteAccount(accountId: string, body: AccountChange) {
  return fetchJson(`/site/accounts/${accountId}`, siteAccountSchema, { method: 'PATCH', body });
}

/** Closes or opens an account, or makes it a site administrator. */
export function useUpdateSiteAccount() {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: ({ accountId, change }: { accountId: string; change: AccountChange }) =>
      updateSiteAccount(accountId, change),
    onSuccess: () => queryClient.invalidateQueries({ queryKey: siteAccountListQuery().queryKey }),
  });
}
