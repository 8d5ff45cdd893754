import { useMutation, useQueryClient } from '@tanstack/react-query';
import type { ArealGeometry } from '../../../../shared/contracts/geometry.ts';
import { projectSchema } from '../../../../shared/contracts/project.ts';
import { fetchJson } from '../../lib/fetch-json.ts';
import { projectKey, projectQuery } from '../../lib/project/project-query.ts';

interface StudyAreaChange {
  geometry: ArealGeometry | null;
  version: number;
}

function setStudyArea(projectId: string, body: StudyAreaChange) {
  return fetchJson(`/projects/${projectId}/study-area`, projectSchema, { method: 'PUT', body });
}

/** Sets or removes (null) the project's study area against the project's version. */
export function useSetStudyArea(projectId: string) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (change: StudyAreaChange) => setStudyArea(projectId, change),
    onSuccess: (project) => {
      queryClient.setQueryData(projectQuery(projectId).queryKey, project);
      void queryClient.invalidateQueries({ queryKey: projectKey(projectId, 'overview') });
    },
    // The project as the other person left it, so that the second try stands on it.
    onError: () => queryClient.invalidateQueries({ queryKey: projectQuery(projectId).queryKey }),
  });
}
