import { useMutation, useQueryClient } from '@tanstack/react-query';
import { accountSchema } from '../../../../shared/contracts/account.ts';
import { fetchJson } from '../../lib/fetch-json.ts';

const renameAccount = (name: string) => fetchJson('/account', accountSchema, { method: 'PATCH', body: { name } });

/** Changes the name others see. */
export function useRenameAccount() {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: renameAccount,
    // The session carries the name the rail prints.
    onSuccess: (account) => queryClient.setQueryData(['session'], { account }),
  });
}
