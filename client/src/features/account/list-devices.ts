import { queryOptions, useQuery } from '@tanstack/react-query';
import { deviceListSchema } from '../../../../shared/contracts/account.ts';
import { fetchJson } from '../../lib/fetch-json.ts';

const listDevices = (signal: AbortSignal) => fetchJson('/account/devices', deviceListSchema, { signal });

/** Browsers signed in to the viewer's account, last seen first. */
export const deviceListQuery = () =>
  queryOptions({
    queryKey: ['devices'],
    queryFn: ({ signal }) => listDevices(signal),
    select: ({ devices }) => devices,
  });

export function useDevices() {
  return useQuery(deviceListQuery());
}
