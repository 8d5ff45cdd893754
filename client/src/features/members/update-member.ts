import { useMutation, useQueryClient } from '@tanstack/react-query';
import type { ProjectRole } from '../../../../shared/constants/roles.ts';
import { memberSchema } from '../../../../shared/contracts/project.ts';
import { fetchJson } from '../../lib/fetch-json.ts';
import { projectQuery } from '../../lib/project/project-query.ts';
import { memberListQuery } from './list-members.ts';

function updateMember(projectId: string, memberId: string, roles: readonly ProjectRole[]) {
  return fetchJson(`/projects/${projectId}/members/${memberId}`, memberSchema, { method: 'PATCH', body: { roles } });
}

/** Changes a person's roles; when it is the viewer, what they may do changes with it. */
export function useUpdateMember(projectId: string) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: ({ memberId, roles }: { memberId: string; roles: readonly ProjectRole[] }) =>
      updateMember(projectId, memberId, roles),
    onSuccess: async () => {
      void queryClient.invalidateQueries({ queryKey: projectQuery(projectId).queryKey });
      await queryClient.invalidateQueries({ queryKey: memberListQuery(projectId).queryKey });
    },
  });
}
