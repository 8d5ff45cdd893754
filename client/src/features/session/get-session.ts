import { queryOptions, useQuery } from '@tanstack/react-query';
import { type Session, sessionSchema } from '../../../../shared/contracts/account.ts';
import { fetchJson } from '../../lib/fetch-json.ts';

/** Asks who is signed in; the account is null when nobody is. */
function getSession(signal?: AbortSignal): Promise<Session> {
  return fetchJson('/session', sessionSchema, { signal });
}

export const sessionQuery = () =>
  queryOptions({ queryKey: ['session'], queryFn: ({ signal }) => getSession(signal), staleTime: 5 * 60_000 });

export function useSession() {
  return useQuery(sessionQuery());
}
