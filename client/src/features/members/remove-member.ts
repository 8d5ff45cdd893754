import { useMutation, useQueryClient } from '@tanstack/react-query';
import { sendRequest } from '../../lib/fetch-json.ts';
import { memberListQuery } from './list-members.ts';

function removeMember(projectId: string, memberId: string) {
  return sendRequest(`/projects/${projectId}/members/${memberId}`, { method: 'DELETE' });
}

/** Takes a person out of the project; their samples stay. */
export function useRemoveMember(projectId: string) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (memberId: string) => removeMember(projectId, memberId),
    onSuccess: () => queryClient.invalidateQueries({ queryKey: memberListQuery(projectId).queryKey }),
  });
}
