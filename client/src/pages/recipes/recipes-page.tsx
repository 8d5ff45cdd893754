import { useState } from 'react';
import { Link } from 'react-router-dom';
import { PageHeader } from '../../components/layout/page-header.tsx';
import { ReadingPage, Section } from '../../components/layout/reading-page.tsx';
import { ForbiddenState } from '../../components/ui/access-states.tsx';
import { EmptyState } from '../../components/ui/empty-state.tsx';
import { ErrorState } from '../../components/ui/error-state.tsx';
import { Field } from '../../components/ui/field.tsx';
import { PendingState } from '../../components/ui/pending-state.tsx';
import { Select } from '../../components/ui/select.tsx';
import { RecipeList } from '../../features/recipes/recipe-list.tsx';
import { useNamedRecipes } from '../../features/recipes/recipe-queries.ts';
import { useRuns } from '../../features/runs/list-runs.ts';
import { RecipeDiff } from '../../features/runs/recipe-diff.tsx';
import { describeRecipe, runTitle } from '../../features/runs/recipe-text.ts';
import { paths } from '../../lib/paths.ts';
import { useProject } from '../../lib/project/project-context.ts';

/** Recipes kept under a name, and what sets two recipes apart. */
export function RecipesPage() {
  const { id, abilities } = useProject();
  const recipes = useNamedRecipes(id, abilities.readRuns);
  return (
    <ReadingPage
      header={
        <PageHeader title="Recipes">
          <Link to={paths.runs(id)} className="link text-sm">
            All runs
          </Link>
        </PageHeader>
      }
    >
      {!abilities.readRuns && <ForbiddenState />}
      {abilities.readRuns && recipes.isPending && <PendingState label="Loading recipes" rows={4} />}
      {recipes.isError && !recipes.data && <ErrorState error={recipes.error} onRetry={() => void recipes.refetch()} />}
      {recipes.data && (
        <div className="space-y-10">
          {recipes.data.length === 0 ? (
            <EmptyState title="No recipe is kept yet">
              Open a run and choose “Keep recipe…” from its menu. A kept recipe can be started from at any time, and
              compared with others.
            </EmptyState>
          ) : (
            <RecipeList projectId={id} recipes={recipes.data} describe={describeRecipe} />
          )}
          <CompareRecipes named={recipes.data} />
        </div>
      )}
    </ReadingPage>
  );
}

function CompareRecipes({ named }: { named: readonly { id: string; name: string }[] }) {
  const { id } = useProject();
  const runs = useRuns(id);
  const [left, setLeft] = useState<string | null>(null);
  const [right, setRight] = useState<string | null>(null);
  const options = [
    ...named.map((one) => ({ value: `recipe:${one.id}`, label: one.name })),
    ...(runs.data ?? []).map((run) => ({
      value: `run:${run.id}`,
      label: `${runTitle(run)}${run.name ? `, ${run.name}` : ''}`,
    })),
  ];
  if (options.length < 2) return null;
  return (
    <Section title="Compare two recipes" note="Of runs or kept ones, setting by setting.">
      <div className="mb-4 grid max-w-2xl gap-4 sm:grid-cols-2">
        <Field label="One">
          <Select value={left} onChange={setLeft} options={options} />
        </Field>
        <Field label="The other">
          <Select value={right} onChange={setRight} options={options} />
        </Field>
      </div>
      {left && right && <RecipeDiff projectId={id} left={left} right={right} />}
    </Section>
  );
}
