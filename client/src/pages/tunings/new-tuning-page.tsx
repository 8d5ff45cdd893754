import { useState } from 'react';
import { useNavigate, useSearchParams } from 'react-router-dom';
import type { Recipe } from '../../../../shared/contracts/run.ts';
import { PageHeader } from '../../components/layout/page-header.tsx';
import { ReadingPage } from '../../components/layout/reading-page.tsx';
import { ForbiddenState } from '../../components/ui/access-states.tsx';
import { Button } from '../../components/ui/button.tsx';
import { EmptyState } from '../../components/ui/empty-state.tsx';
import { ErrorState } from '../../components/ui/error-state.tsx';
import { Field } from '../../components/ui/field.tsx';
import { PendingState } from '../../components/ui/pending-state.tsx';
import { Select } from '../../components/ui/select.tsx';
import { useNamedRecipes } from '../../features/recipes/recipe-queries.ts';
import { defaultDraft } from '../../features/runs/default-recipe.ts';
import { useRuns } from '../../features/runs/list-runs.ts';
import { describeRecipe, runTitle } from '../../features/runs/recipe-text.ts';
import { TuningForm } from '../../features/tuning/tuning-form.tsx';
import { useStartTuning } from '../../features/tuning/tuning-queries.ts';
import { paths } from '../../lib/paths.ts';
import { useClasses } from '../../lib/project/classes-query.ts';
import { useProject } from '../../lib/project/project-context.ts';
import { useScenes } from '../../lib/project/scenes-query.ts';

const TITLE = 'New search';
const FORM_ID = 'tuning';

interface Base {
  value: string;
  label: string;
  recipe: Recipe;
}

/** What a search begins with and tries; `?from=<run>` or `?recipe=<id>` chooses the recipe. */
export function NewTuningPage() {
  const { id, abilities } = useProject();
  const [query] = useSearchParams();
  const runs = useRuns(id, abilities.startRuns);
  const named = useNamedRecipes(id, abilities.startRuns);
  const scenes = useScenes(id);
  const classes = useClasses(id);
  if (!abilities.startRuns) {
    return (
      <Plain>
        <ForbiddenState>Leads and modellers tune classifiers. Your project lead gives out roles.</ForbiddenState>
      </Plain>
    );
  }
  const failed = [runs, named, scenes, classes].find((one) => one.isError && !one.data);
  if (failed) {
    return (
      <Plain>
        <ErrorState error={failed.error} onRetry={() => void failed.refetch()} />
      </Plain>
    );
  }
  if (!runs.data || !named.data || !scenes.data || !classes.data) {
    return (
      <Plain>
        <PendingState label="Loading recipes" rows={6} />
      </Plain>
    );
  }
  const plain = defaultDraft(scenes.data, classes.data);
  const bases: Base[] = [
    ...(plain ? [{ value: 'default', label: 'As a new run begins', recipe: plain.recipe }] : []),
    ...named.data.map((one) => ({ value: `recipe:${one.id}`, label: one.name, recipe: one.recipe })),
    ...runs.data.map((run) => ({
      value: `run:${run.id}`,
      label: `${runTitle(run)}${run.name ? `, ${run.name}` : ''}`,
      recipe: run.recipe,
    })),
  ];
  const wanted = query.get('from') ? `run:${query.get('from')}` : `recipe:${query.get('recipe')}`;
  const first = bases.find(({ value }) => value === wanted) ?? bases[0];
  if (!first) {
    return (
      <Plain>
        <EmptyState title="Nothing to tune yet">
          A search needs a scene and samples of at least two classes to learn from.
        </EmptyState>
      </Plain>
    );
  }
  return <NewTuning bases={bases} first={first} />;
}

function Plain({ children }: { children: React.ReactNode }) {
  return <ReadingPage header={<PageHeader title={TITLE} />}>{children}</ReadingPage>;
}

function NewTuning({ bases, first }: { bases: readonly Base[]; first: Base }) {
  const { id } = useProject();
  const navigate = useNavigate();
  const [base, setBase] = useState(first);
  const start = useStartTuning(id);
  return (
    <ReadingPage
      header={
        <PageHeader
          title={TITLE}
          action={
            <>
              <Button onClick={() => void navigate(-1)}>Leave</Button>
              <Button kind="primary" type="submit" form={FORM_ID} isPending={start.isPending} pendingLabel="Starting…">
                Start search
              </Button>
            </>
          }
        />
      }
    >
      <div className="max-w-3xl space-y-8">
        <Field label="Recipe to begin with" hint={describeRecipe(base.recipe)} className="max-w-md">
          <Select
            value={base.value}
            options={bases}
            onChange={(value) => setBase(bases.find((one) => one.value === value) ?? first)}
          />
        </Field>
        <TuningForm
          key={base.value}
          formId={FORM_ID}
          recipe={base.recipe}
          start={start}
          onStarted={(tuning) => void navigate(paths.tuning(id, tuning.id))}
        />
      </div>
    </ReadingPage>
  );
}
