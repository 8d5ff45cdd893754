import { type ReactNode, useEffect, useMemo, useState } from 'react';
import { Link, useNavigate, useSearchParams } from 'react-router-dom';
import type { Run } from '../../../../shared/contracts/run.ts';
import { PageHeader } from '../../components/layout/page-header.tsx';
import { ReadingPage, Section } from '../../components/layout/reading-page.tsx';
import { ForbiddenState } from '../../components/ui/access-states.tsx';
import { Button, buttonClass } from '../../components/ui/button.tsx';
import { Callout } from '../../components/ui/callout.tsx';
import { EmptyState } from '../../components/ui/empty-state.tsx';
import { ErrorState } from '../../components/ui/error-state.tsx';
import { PendingState } from '../../components/ui/pending-state.tsx';
import { useCreateDesign } from '../../features/designs/create-design.ts';
import { useDesigns } from '../../features/designs/list-designs.ts';
import { useDesignPlan } from '../../features/designs/plan-design.ts';
import { PlanForm } from '../../features/designs/plan-form.tsx';
import { PlanOutcome } from '../../features/designs/plan-outcome.tsx';
import { createInput, defaultPlan, readPlan } from '../../features/designs/plan-values.ts';
import { StrataTable } from '../../features/designs/strata-table.tsx';
import { useRuns } from '../../features/runs/list-runs.ts';
import { paths } from '../../lib/paths.ts';
import { useClasses } from '../../lib/project/classes-query.ts';
import { useProject } from '../../lib/project/project-context.ts';

const TITLE = 'New reference design';
const REST_MS = 350;

/** Plans a probability sample of a map's pixels; `?run=` chooses the map. */
export function DesignPlanPage() {
  const { id, abilities } = useProject();
  const [query] = useSearchParams();
  const designs = useDesigns(id, abilities.readAccuracy);
  const runs = useRuns(id, abilities.readAccuracy);
  const failed = [designs, runs].find((one) => one.isError && !one.data);
  if (failed) {
    return (
      <Plain>
        <ErrorState error={failed.error} onRetry={() => void failed.refetch()} />
      </Plain>
    );
  }
  if (!abilities.readAccuracy || designs.data?.abilities.plan === false) {
    return (
      <Plain>
        <ForbiddenState>Leads and reviewers plan reference points. Your project lead gives out roles.</ForbiddenState>
      </Plain>
    );
  }
  if (!designs.data || !runs.data) {
    return (
      <Plain>
        <PendingState label="Loading the runs" rows={8} />
      </Plain>
    );
  }
  if (designs.data.mapsWithheld) {
    return (
      <Plain>
        <Callout tone="beware" title="Not while you interpret.">
          A plan tells how much of each class the map holds. It can be made once the open design is closed.
        </Callout>
      </Plain>
    );
  }
  const finished = runs.data.filter(({ job }) => job.state === 'finished').toSorted((a, b) => b.number - a.number);
  const first = finished.find((run) => run.id === query.get('run')) ?? finished[0];
  if (!first) {
    return (
      <Plain>
        <EmptyState
          title="No map to judge yet"
          action={
            <Link to={paths.runs(id)} className={buttonClass('primary')}>
              Go to runs
            </Link>
          }
        >
          Reference points are drawn at random from the pixels of a finished class map.
        </EmptyState>
      </Plain>
    );
  }
  return <Planner runs={finished} first={first} />;
}

function Plain({ children }: { children: ReactNode }) {
  return <ReadingPage header={<PageHeader title={TITLE} />}>{children}</ReadingPage>;
}

function Planner({ runs, first }: { runs: readonly Run[]; first: Run }) {
  const project = useProject();
  const navigate = useNavigate();
  const [values, setValues] = useState(() => defaultPlan(first.id));
  const { plan: asked, problem } = useMemo(() => readPlan(values), [values]);
  const [settled, setSettled] = useState(asked);
  useEffect(() => {
    const timer = setTimeout(() => setSettled(asked), REST_MS);
    return () => clearTimeout(timer);
  }, [asked]);
  const plan = useDesignPlan(project.id, settled);
  const create = useCreateDesign(project.id);
  const classes = useClasses(project.id);
  const positions = new Map(classes.data?.map(({ id, position }) => [id, position]));
  const draw = () => {
    if (!asked) return;
    create.mutate(createInput(asked, values), {
      onSuccess: (design) => void navigate(paths.design(project.id, design.id)),
    });
  };
  return (
    <ReadingPage
      header={
        <PageHeader
          title={TITLE}
          action={
            <>
              <Button onClick={() => void navigate(paths.accuracy(project.id))}>Leave</Button>
              <Button
                kind="primary"
                onClick={draw}
                disabled={asked === null || plan.isError}
                isPending={create.isPending}
                pendingLabel="Drawing points…"
              >
                Draw points
              </Button>
            </>
          }
        />
      }
    >
      <div className="grid items-start gap-9 lg:grid-cols-[minmax(0,1fr)_22rem] min-[82rem]:grid-cols-[minmax(0,1fr)_26rem]">
        <PlanForm values={values} onChange={setValues} runs={runs} positions={positions} />
        <div className="lg:sticky lg:top-0">
          {create.error && <ErrorState error={create.error} isInline className="mb-5" />}
          <PlanOutcome plan={plan} problem={problem} />
        </div>
      </div>
      {plan.data && !problem && (
        <Section title="Strata" className="mt-9">
          <StrataTable strata={plan.data.strata} positions={positions} />
        </Section>
      )}
    </ReadingPage>
  );
}
