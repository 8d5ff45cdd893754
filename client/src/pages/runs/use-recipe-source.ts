import { useSearchParams } from 'react-router-dom';
import type { Recipe } from '../../../../shared/contracts/run.ts';
import { useNamedRecipes } from '../../features/recipes/recipe-queries.ts';
import { useRun } from '../../features/runs/get-run.ts';
import { useTuning } from '../../features/tuning/tuning-queries.ts';

/** A recipe to fill the form with, and what it is called in a sentence. */
export interface RecipeSource {
  key: string;
  label: string;
  name: string;
  note: string;
  recipe: Recipe;
}

/** What the address asks a new run to begin with: `?from=<run>`, `?recipe=<id>`, or `?tuning=<id>&trial=<n>`. */
export function useRecipeSource(projectId: string, isOn: boolean) {
  const [query] = useSearchParams();
  const ask = (name: string) => (isOn ? query.get(name) : null);
  const [runId, recipeId, tuningId] = [ask('from'), ask('recipe'), ask('tuning')];
  const run = useRun(projectId, runId);
  const recipes = useNamedRecipes(projectId, recipeId !== null);
  const tuning = useTuning(projectId, tuningId);
  const asked = runId ? run : recipeId ? recipes : tuningId ? tuning : null;
  return { asked, isPending: asked !== null && !asked.data, source: find() };

  function find(): RecipeSource | null {
    if (runId && run.data) {
      const { number, name, note, recipe } = run.data;
      return { key: runId, label: `run ${number}`, name, note, recipe };
    }
    const named = recipes.data?.find(({ id }) => id === recipeId);
    if (named) return { key: named.id, label: `“${named.name}”`, name: named.name, note: '', recipe: named.recipe };
    const trial = tuning.data?.trials.find(({ number }) => String(number) === query.get('trial'));
    if (tuning.data && trial) {
      const recipe = { ...tuning.data.recipe, classifier: trial.classifier };
      const label = `trial ${trial.number}${tuning.data.name ? ` of ${tuning.data.name}` : ''}`;
      return { key: `${tuning.data.id} ${trial.number}`, label, name: '', note: `Settings of ${label}.`, recipe };
    }
    return null;
  }
}
