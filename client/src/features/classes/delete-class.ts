import { useMutation, useQueryClient } from '@tanstack/react-query';
import { sendRequest } from '../../lib/fetch-json.ts';
import { refreshScheme } from './refresh-scheme.ts';

function deleteClass(classId: string, moveSamplesTo: string | null) {
  const body = moveSamplesTo ? { moveSamplesTo } : {};
  return sendRequest(`/classes/${classId}`, { method: 'DELETE', body });
}

/** Deletes a class; its samples go to `moveSamplesTo`. */
export function useDeleteClass(projectId: string) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: ({ classId, moveSamplesTo }: { classId: string; moveSamplesTo: string | null }) =>
      deleteClass(classId, moveSamplesTo),
    onSettled: () => refreshScheme(queryClient, projectId),
  });
}
