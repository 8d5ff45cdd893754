import { useMutation, useQueryClient } from '@tanstack/react-query';
import { type CreateLandClass, landClassSchema } from '../../../../shared/contracts/land-class.ts';
import { fetchJson } from '../../lib/fetch-json.ts';
import { refreshScheme } from './refresh-scheme.ts';

function createClass(projectId: string, body: CreateLandClass) {
  return fetchJson(`/projects/${projectId}/classes`, landClassSchema, { method: 'POST', body });
}

/** Adds a class at the end of the scheme. */
export function useCreateClass(projectId: string) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (landClass: CreateLandClass) => createClass(projectId, landClass),
    onSuccess: () => refreshScheme(queryClient, projectId),
  });
}
