import { queryOptions, useQuery } from '@tanstack/react-query';
import { welcomeSchema } from '../../../../shared/contracts/account.ts';
import { fetchJson } from '../../lib/fetch-json.ts';

const getWelcome = (secret: string, signal: AbortSignal) =>
  fetchJson(`/welcome/${encodeURIComponent(secret)}`, welcomeSchema, { signal });

/** Whom a welcome or reset link is for. */
const welcomeQuery = (secret: string) =>
  queryOptions({
    queryKey: ['welcome', secret],
    queryFn: ({ signal }) => getWelcome(secret, signal),
    // A used link is gone: asking again behind an open form would take the form away.
    staleTime: Infinity,
  });

export function useWelcome(secret: string) {
  return useQuery(welcomeQuery(secret));
}
