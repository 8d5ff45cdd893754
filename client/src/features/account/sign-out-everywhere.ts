import { useMutation, useQueryClient } from '@tanstack/react-query';
import { sendRequest } from '../../lib/fetch-json.ts';

/** Signs the account out in every browser, this one too, and forgets everything it saw here. */
export function useSignOutEverywhere() {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: () => sendRequest('/account/devices', { method: 'DELETE' }),
    onSuccess: () => {
      queryClient.clear();
      queryClient.setQueryData(['session'], { account: null });
    },
  });
}
