import { keepPreviousData, queryOptions, useQuery } from '@tanstack/react-query';
import { type Recipe, recipeCheckSchema } from '../../../../shared/contracts/run.ts';
import { fetchJson } from '../../lib/fetch-json.ts';
import { projectKey } from '../../lib/project/project-query.ts';

const checkRecipe = (projectId: string, recipe: Recipe, signal: AbortSignal) =>
  fetchJson(`/projects/${projectId}/runs/check`, recipeCheckSchema, { method: 'POST', body: recipe, signal });

/** What a recipe comes to with the samples as they stand; kept under `samples`, so that it is asked again when they change. */
const recipeCheckQuery = (projectId: string, recipe: Recipe) =>
  queryOptions({
    queryKey: projectKey(projectId, 'samples', 'recipe-check', recipe),
    queryFn: ({ signal }) => checkRecipe(projectId, recipe, signal),
    placeholderData: keepPreviousData,
  });

/** Nothing is asked while the recipe is null (a field of it is wrong). */
export function useRecipeCheck(projectId: string, recipe: Recipe | null) {
  return useQuery({ ...recipeCheckQuery(projectId, recipe as Recipe), enabled: recipe !== null });
}
