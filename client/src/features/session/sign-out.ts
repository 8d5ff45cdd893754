import { useMutation, useQueryClient } from '@tanstack/react-query';
import { sendRequest } from '../../lib/fetch-json.ts';
import { sessionQuery } from './get-session.ts';

/** Signs out and forgets everything this account saw. */
export function useSignOut() {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: () => sendRequest('/session', { method: 'DELETE' }),
    onSuccess: () => {
      queryClient.clear();
      queryClient.setQueryData(sessionQuery().queryKey, { account: null });
    },
  });
}
