import { useMutation } from '@tanstack/react-query';
import { accountLinkSchema } from '../../../../shared/contracts/account.ts';
import { fetchJson } from '../../lib/fetch-json.ts';

function sendAccountLink(accountId: string) {
  return fetchJson(`/site/accounts/${accountId}/link`, accountLinkSchema, { method: 'POST' });
}

/** Sends a new welcome link (no password chosen yet) or a reset link; older ones stop working. */
export function useSendAccountLink() {
  return useMutation({ mutationFn: sendAccountLink });
}
