import { queryOptions, useQuery } from '@tanstack/react-query';
import { agreementSchema } from '../../../../shared/contracts/reference.ts';
import { fetchJson } from '../../lib/fetch-json.ts';
import { projectKey } from '../../lib/project/project-query.ts';

const getAgreement = (designId: string, signal: AbortSignal) =>
  fetchJson(`/designs/${designId}/agreement`, agreementSchema, { signal });

/** How far the interpreters agree; only once the blind check has ended. */
const agreementQuery = (projectId: string, designId: string) =>
  queryOptions({
    queryKey: projectKey(projectId, 'designs', designId, 'agreement'),
    queryFn: ({ signal }) => getAgreement(designId, signal),
  });

export function useAgreement(projectId: string, designId: string, isOn: boolean) {
  return useQuery({ ...agreementQuery(projectId, designId), enabled: isOn });
}
