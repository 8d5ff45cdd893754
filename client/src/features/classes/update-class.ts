import { useMutation, useQueryClient } from '@tanstack/react-query';
import type { z } from 'zod';
import { landClassSchema, type updateLandClassSchema } from '../../../../shared/contracts/land-class.ts';
import { fetchJson } from '../../lib/fetch-json.ts';
import { refreshScheme } from './refresh-scheme.ts';

type ClassChange = z.infer<typeof updateLandClassSchema>;

function updateClass(classId: string, body: ClassChange) {
  return fetchJson(`/classes/${classId}`, landClassSchema, { method: 'PATCH', body });
}

/** Changes a class that still stands at `version`; a 409 carries the class as it stands. */
export function useUpdateClass(projectId: string) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: ({ classId, change }: { classId: string; change: ClassChange }) => updateClass(classId, change),
    // After a conflict, too: the list then shows what the other person made of it.
    onSettled: () => refreshScheme(queryClient, projectId),
  });
}
