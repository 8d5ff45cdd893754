import { useMutation, useQueryClient } from '@tanstack/react-query';
import type { z } from 'zod';
import { type acceptWelcomeSchema, sessionSchema } from '../../../../shared/contracts/account.ts';
import { fetchJson } from '../../lib/fetch-json.ts';

export type WelcomeAnswer = z.infer<typeof acceptWelcomeSchema>;

function acceptWelcome(secret: string, body: WelcomeAnswer) {
  return fetchJson(`/welcome/${encodeURIComponent(secret)}`, sessionSchema, { method: 'POST', body });
}

/** Chooses name and password through a link; the browser is signed in afterwards. */
export function useAcceptWelcome(secret: string) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (answer: WelcomeAnswer) => acceptWelcome(secret, answer),
    onSuccess: (session) => {
      // What another account saw in this browser is forgotten first.
      queryClient.clear();
      queryClient.setQueryData(['session'], session);
    },
  });
}
