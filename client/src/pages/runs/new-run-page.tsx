import { useCallback, useMemo, useState } from 'react';
import { useNavigate } from 'react-router-dom';
import type { LandClass } from '../../../../shared/contracts/land-class.ts';
import type { Recipe } from '../../../../shared/contracts/run.ts';
import type { Scene } from '../../../../shared/contracts/scene.ts';
import { PageHeader } from '../../components/layout/page-header.tsx';
import { ReadingPage } from '../../components/layout/reading-page.tsx';
import { ForbiddenState } from '../../components/ui/access-states.tsx';
import { Button } from '../../components/ui/button.tsx';
import { Callout } from '../../components/ui/callout.tsx';
import { ErrorState } from '../../components/ui/error-state.tsx';
import { PendingState } from '../../components/ui/pending-state.tsx';
import { useRecipeCheck } from '../../features/runs/check-recipe.ts';
import { type RunDraft, defaultDraft, draftFromRun } from '../../features/runs/default-recipe.ts';
import { RecipeCheckPanel } from '../../features/runs/recipe-check-panel.tsx';
import { RecipeForm } from '../../features/runs/recipe-form.tsx';
import { useStartRun } from '../../features/runs/start-run.ts';
import { paths } from '../../lib/paths.ts';
import { useClasses } from '../../lib/project/classes-query.ts';
import { useProject } from '../../lib/project/project-context.ts';
import { useScenes } from '../../lib/project/scenes-query.ts';
import { NoRunYet } from './no-run-yet.tsx';
import { type RecipeSource, useRecipeSource } from './use-recipe-source.ts';

const TITLE = 'New run';

/** The recipe of a new run; the address may ask for another one to begin with. */
export function NewRunPage() {
  const { id, abilities } = useProject();
  const scenes = useScenes(id);
  const classes = useClasses(id);
  const { asked, isPending, source } = useRecipeSource(id, abilities.startRuns);
  if (!abilities.startRuns) {
    return (
      <Plain>
        <ForbiddenState>Leads and modellers start runs. Your project lead gives out roles.</ForbiddenState>
      </Plain>
    );
  }
  const failed = [scenes, classes, asked].find((one) => one?.isError && !one.data);
  if (failed) {
    return (
      <Plain>
        <ErrorState error={failed.error} onRetry={() => void failed.refetch()} />
      </Plain>
    );
  }
  if (!scenes.data || !classes.data || isPending) {
    return (
      <Plain>
        <PendingState label="Loading scenes and classes" rows={8} />
      </Plain>
    );
  }
  return <NewRun key={source?.key} scenes={scenes.data} classes={classes.data} from={source} />;
}

function Plain({ children }: { children: React.ReactNode }) {
  return <ReadingPage header={<PageHeader title={TITLE} />}>{children}</ReadingPage>;
}

interface NewRunProps {
  scenes: readonly Scene[];
  classes: readonly LandClass[];
  from: RecipeSource | null;
}

function NewRun({ scenes, classes, from }: NewRunProps) {
  const ready = useMemo(() => scenes.filter((scene) => scene.state === 'ready'), [scenes]);
  // The form starts once; what others change meanwhile shows in the check, not under the fingers.
  const [start] = useState(() => {
    if (from) return draftFromRun(from, scenes, classes);
    const draft = defaultDraft(scenes, classes);
    return draft && { draft, lost: [] };
  });
  if (ready.length === 0 || classes.length < 2 || !start) {
    return (
      <Plain>
        <NoRunYet />
      </Plain>
    );
  }
  return <RecipePage draft={start.draft} lost={start.lost} from={from} scenes={ready} classes={classes} />;
}

const FORM_ID = 'recipe';

function RecipePage({ draft, lost, from, scenes, classes }: NewRunProps & { draft: RunDraft; lost: string[] }) {
  const project = useProject();
  const navigate = useNavigate();
  const [recipe, setRecipe] = useState<Recipe | null>(draft.recipe);
  const takeRecipe = useCallback((next: Recipe | null) => setRecipe(next), []);
  const check = useRecipeCheck(project.id, recipe);
  const start = useStartRun(project.id);
  const isStopped = check.data?.problems.some(({ severity }) => severity === 'stops') ?? false;
  return (
    <ReadingPage
      header={
        <PageHeader
          title={TITLE}
          crumb={from ? `by the recipe of ${from.label}` : undefined}
          action={
            <>
              <Button onClick={() => void navigate(-1)}>Leave</Button>
              <Button
                kind="primary"
                type="submit"
                form={FORM_ID}
                isPending={start.isPending}
                pendingLabel="Starting…"
                disabled={isStopped && recipe !== null}
                aria-describedby="recipe-check"
              >
                Start run
              </Button>
            </>
          }
        />
      }
    >
      <div className="grid items-start gap-8 md:grid-cols-[minmax(0,1fr)_20rem] min-[82rem]:grid-cols-[minmax(0,1fr)_24rem]">
        <div>
          {lost.length > 0 && (
            <Callout tone="beware" title="Not quite the same recipe." className="mb-5">
              Gone since {from?.label}: {lost.join(', ')}. Look at what is chosen below.
            </Callout>
          )}
          <RecipeForm
            formId={FORM_ID}
            draft={draft}
            scenes={scenes}
            classes={classes}
            start={start}
            onRecipe={takeRecipe}
            onStarted={(run) => void navigate(paths.run(project.id, run.id))}
          />
        </div>
        <div className="md:sticky md:top-0">
          <RecipeCheckPanel recipe={recipe} check={check} classes={classes} />
        </div>
      </div>
    </ReadingPage>
  );
}
