import { useMutation, useQueryClient } from '@tanstack/react-query';
import type { z } from 'zod';
import { addMemberResultSchema, type addMemberSchema } from '../../../../shared/contracts/project.ts';
import { fetchJson } from '../../lib/fetch-json.ts';
import { memberListQuery } from './list-members.ts';

export type NewMember = z.infer<typeof addMemberSchema>;
export type AddedMember = z.infer<typeof addMemberResultSchema>;

function addMember(projectId: string, body: NewMember) {
  return fetchJson(`/projects/${projectId}/members`, addMemberResultSchema, { method: 'POST', body });
}

/** Adds a person by e-mail; the answer carries a link to pass on when no letter could be sent. */
export function useAddMember(projectId: string) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (member: NewMember) => addMember(projectId, member),
    onSuccess: () => queryClient.invalidateQueries({ queryKey: memberListQuery(projectId).queryKey }),
  });
}
