import { queryOptions, useQuery } from '@tanstack/react-query';
import { siteStorageSchema } from '../../../../shared/contracts/account.ts';
import { fetchJson } from '../../lib/fetch-json.ts';

const getStorage = (signal: AbortSignal) => fetchJson('/site/storage', siteStorageSchema, { signal });

/** What the stored files take, in bytes. */
const storageQuery = () => queryOptions({ queryKey: ['site', 'storage'], queryFn: ({ signal }) => getStorage(signal) });

export function useStorage() {
  return useQuery(storageQuery());
}
