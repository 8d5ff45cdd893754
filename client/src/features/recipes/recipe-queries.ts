import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import {
  type CreateNamedRecipe,
  type UpdateNamedRecipe,
  namedRecipeListSchema,
  namedRecipeSchema,
} from '../../../../shared/contracts/named-recipe.ts';
import { fetchJson, sendRequest } from '../../lib/fetch-json.ts';
import { projectKey } from '../../lib/project/project-query.ts';

const recipesKey = (projectId: string) => projectKey(projectId, 'runs', 'recipes');

/** The project's recipes kept under a name. */
export function useNamedRecipes(projectId: string, isOn = true) {
  return useQuery({
    queryKey: recipesKey(projectId),
    queryFn: ({ signal }) => fetchJson(`/projects/${projectId}/recipes`, namedRecipeListSchema, { signal }),
    select: ({ recipes }) => recipes,
    enabled: isOn,
  });
}

function useRefresh(projectId: string) {
  const queryClient = useQueryClient();
  return () => queryClient.invalidateQueries({ queryKey: recipesKey(projectId) });
}

/** Keeps a recipe under a name. */
export function useSaveRecipe(projectId: string) {
  return useMutation({
    mutationFn: (body: CreateNamedRecipe) =>
      fetchJson(`/projects/${projectId}/recipes`, namedRecipeSchema, { method: 'POST', body }),
    onSettled: useRefresh(projectId),
  });
}

/** Renames a recipe or changes its note. */
export function useUpdateRecipe(projectId: string) {
  return useMutation({
    mutationFn: ({ id, ...body }: UpdateNamedRecipe & { id: string }) =>
      fetchJson(`/recipes/${id}`, namedRecipeSchema, { method: 'PATCH', body }),
    onSettled: useRefresh(projectId),
  });
}

/** Deletes a recipe; runs made from it stay. */
export function useDeleteRecipe(projectId: string) {
  return useMutation({
    mutationFn: (id: string) => sendRequest(`/recipes/${id}`, { method: 'DELETE' }),
    onSettled: useRefresh(projectId),
  });
}
