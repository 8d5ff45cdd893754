import { useMutation, useQueryClient } from '@tanstack/react-query';
import { type SignIn, sessionSchema } from '../../../../shared/contracts/account.ts';
import { fetchJson } from '../../lib/fetch-json.ts';
import { sessionQuery } from './get-session.ts';

function signIn(body: SignIn) {
  return fetchJson('/session', sessionSchema, { method: 'POST', body });
}

/** Signs in; what another account saw in this browser is forgotten first. */
export function useSignIn() {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: signIn,
    onSuccess: (session) => {
      queryClient.clear();
      queryClient.setQueryData(sessionQuery().queryKey, session);
    },
  });
}
