import { useMutation, useQueryClient } from '@tanstack/react-query';
import type { z } from 'zod';
import { type createDesignSchema, designSchema } from '../../../../shared/contracts/reference.ts';
import { fetchJson } from '../../lib/fetch-json.ts';
import { projectKey } from '../../lib/project/project-query.ts';
import { designQuery } from './get-design.ts';

export type CreateDesignInput = z.input<typeof createDesignSchema>;

const createDesign = (projectId: string, body: CreateDesignInput) =>
  fetchJson(`/projects/${projectId}/designs`, designSchema, { method: 'POST', body });

/** Draws the points of a new draft. */
export function useCreateDesign(projectId: string) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (body: CreateDesignInput) => createDesign(projectId, body),
    onSuccess: (design) => {
      queryClient.setQueryData(designQuery(projectId, design.id).queryKey, design);
      void queryClient.invalidateQueries({ queryKey: projectKey(projectId, 'designs'), exact: true });
    },
  });
}
