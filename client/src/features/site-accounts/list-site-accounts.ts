import { queryOptions, useQuery } from '@tanstack/react-query';
import { siteAccountListSchema } from '../../../../shared/contracts/account.ts';
import { fetchJson } from '../../lib/fetch-json.ts';

const listSiteAccounts = (signal: AbortSignal) => fetchJson('/site/accounts', siteAccountListSchema, { signal });

/** All accounts of this site. */
export const siteAccountListQuery = () =>
  queryOptions({
    queryKey: ['site', 'accounts'],
    queryFn: ({ signal }) => listSiteAccounts(signal),
    select: ({ accounts }) => accounts,
  });

export function useSiteAccounts() {
  return useQuery(siteAccountListQuery());
}
