import { useMutation } from '@tanstack/react-query';
import { sendRequest } from '../../lib/fetch-json.ts';

const askReset = (email: string) => sendRequest('/account/forgotten', { method: 'POST', body: { email } });

/** Asks for a link to choose a new password; the answer is the same whether the account exists. */
export function useAskReset() {
  return useMutation({ mutationFn: askReset });
}
