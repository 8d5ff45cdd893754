import { Download, Printer } from 'lucide-react';
import { Link, useSearchParams } from 'react-router-dom';
import type { DesignList } from '../../../../shared/contracts/reference.ts';
import type { Run } from '../../../../shared/contracts/run.ts';
import { PageHeader } from '../../components/layout/page-header.tsx';
import { ReadingPage } from '../../components/layout/reading-page.tsx';
import { ForbiddenState, NotFoundState } from '../../components/ui/access-states.tsx';
import { buttonClass } from '../../components/ui/button.tsx';
import { Callout } from '../../components/ui/callout.tsx';
import { EmptyState } from '../../components/ui/empty-state.tsx';
import { ErrorState } from '../../components/ui/error-state.tsx';
import { IconButton } from '../../components/ui/icon-button.tsx';
import { PendingState } from '../../components/ui/pending-state.tsx';
import { Select } from '../../components/ui/select.tsx';
import { DesignList as DesignListing } from '../../features/designs/design-list.tsx';
import { useDesigns } from '../../features/designs/list-designs.ts';
import { useRuns } from '../../features/runs/list-runs.ts';
import { runTitle } from '../../features/runs/recipe-text.ts';
import { apiUrl } from '../../lib/fetch-json.ts';
import { formatPercent } from '../../lib/format.ts';
import { paths } from '../../lib/paths.ts';
import { useClasses } from '../../lib/project/classes-query.ts';
import { useProject } from '../../lib/project/project-context.ts';
import { DesignEstimates } from './design-estimates.tsx';
import { HeldOutAccuracy } from './held-out-accuracy.tsx';
import { NoEstimates } from './no-estimates.tsx';

const TITLE = 'Accuracy';

/** How good a run's map is: from reference points, and from held-out samples; `?run=`, `?design=` and `?unit=` choose. */
export function AccuracyPage() {
  const { id, abilities } = useProject();
  const [query] = useSearchParams();
  const runs = useRuns(id, abilities.readAccuracy && abilities.readRuns);
  const designs = useDesigns(id, abilities.readAccuracy);
  if (!abilities.readAccuracy) {
    return (
      <Plain>
        <ForbiddenState title="Accuracy is not open to your role">
          Leads, modellers and reviewers read accuracy: whoever draws samples should not see where the map is wrong
          before drawing more. Your project lead gives out roles.
        </ForbiddenState>
      </Plain>
    );
  }
  const failed = [runs, designs].find((one) => one.isError && !one.data);
  if (failed) {
    return (
      <Plain>
        <ErrorState error={failed.error} onRetry={() => void failed.refetch()} />
      </Plain>
    );
  }
  if (!runs.data || !designs.data) {
    return (
      <Plain>
        <PendingState label="Loading runs" rows={3} />
      </Plain>
    );
  }
  if (designs.data.mapsWithheld) {
    return (
      <Plain>
        <Callout tone="beware" title="Kept from you while you interpret." className="mb-6 max-w-3xl">
          You may interpret the points of an open reference design, so no map, area or accuracy of this project is shown
          to you until it is closed. That keeps the check blind.
        </Callout>
        <DesignListing designs={designs.data.designs} />
      </Plain>
    );
  }
  const finished = runs.data.filter((run) => run.job.state === 'finished').toSorted((a, b) => b.number - a.number);
  const wantedId = query.get('run');
  const run = wantedId ? finished.find((one) => one.id === wantedId) : finished[0];
  if (run) return <RunAccuracy key={run.id} run={run} finished={finished} list={designs.data} />;
  return (
    <Plain>
      {finished.length > 0 ? (
        <NotFoundState
          title="This run has no accuracy"
          action={
            <Link to={paths.accuracy(id)} className={buttonClass('strong')}>
              Open the newest finished run
            </Link>
          }
        >
          It is not finished, or was deleted.
        </NotFoundState>
      ) : (
        <EmptyState
          title="No finished run yet"
          action={
            <Link to={paths.runs(id)} className={buttonClass('primary')}>
              Go to runs
            </Link>
          }
        >
          Accuracy is read from samples a run never saw. Once a run is finished, its confusion matrix and the figures of
          each class stand here, each with its interval.
        </EmptyState>
      )}
    </Plain>
  );
}

function Plain({ children }: { children: React.ReactNode }) {
  return <ReadingPage header={<PageHeader title={TITLE} />}>{children}</ReadingPage>;
}

interface RunAccuracyProps {
  run: Run;
  finished: readonly Run[];
  list: DesignList;
}

/** Two kinds of evidence, one below the other and never mixed: reference points first, then held-out samples. */
function RunAccuracy({ run, finished, list }: RunAccuracyProps) {
  const project = useProject();
  const [query, setQuery] = useSearchParams();
  const classes = useClasses(project.id);
  const positions = new Map(classes.data?.map(({ id, position }) => [id, position]));
  const ofRun = list.designs.filter(({ runId }) => runId === run.id);
  const closed = ofRun.filter(({ state }) => state === 'closed');
  const design = closed.find(({ id }) => id === query.get('design')) ?? closed[0];
  return (
    <ReadingPage
      header={
        <PageHeader
          title={TITLE}
          action={
            <>
              <IconButton label="Print" kind="secondary" icon={<Printer />} onClick={() => window.print()} />
              {design && <EstimateDownload designId={design.id} />}
              {list.abilities.plan && (
                <Link
                  to={paths.newDesign(project.id, run.id)}
                  className={buttonClass(ofRun.length === 0 ? 'primary' : 'secondary')}
                >
                  Plan reference points
                </Link>
              )}
            </>
          }
        >
          <Select
            aria-label="Run"
            size="sm"
            className="w-auto! max-w-64"
            value={run.id}
            onChange={(runId) => setQuery({ run: runId }, { replace: true })}
            options={finished.map((one) => ({ value: one.id, label: runLabel(one) }))}
          />
        </PageHeader>
      }
    >
      <div className="space-y-12">
        <section aria-labelledby="from-points">
          <h2 id="from-points" className="mb-4 border-b-2 border-ink pb-1 text-xl font-semibold">
            From reference points
          </h2>
          {design ? (
            <DesignEstimates
              design={design}
              positions={positions}
              others={finished.filter(({ id }) => id !== run.id)}
              otherDesigns={list.designs.filter(({ id, state }) => state === 'closed' && id !== design.id)}
            />
          ) : (
            <NoEstimates run={run} designs={ofRun} mayPlan={list.abilities.plan} />
          )}
          {ofRun.length > 0 && (
            <div className="mt-8">
              <h3 className="mb-2 text-lg font-semibold">Reference designs of this run</h3>
              <DesignListing designs={ofRun} />
            </div>
          )}
        </section>
        <section aria-labelledby="from-held-out">
          <h2 id="from-held-out" className="mb-4 border-b-2 border-ink pb-1 text-xl font-semibold">
            From held-out samples
          </h2>
          <HeldOutAccuracy run={run} scheme={classes.data ?? []} />
        </section>
      </div>
    </ReadingPage>
  );
}

function EstimateDownload({ designId }: { designId: string }) {
  return (
    <a
      href={apiUrl(`/designs/${designId}/estimates.csv`)}
      download
      className={buttonClass('secondary')}
      aria-label="Download the estimates as CSV"
    >
      <Download aria-hidden />
      CSV
    </a>
  );
}

function runLabel(run: Run): string {
  const name = run.name ? `${runTitle(run)}, ${run.name}` : runTitle(run);
  return run.overallAccuracy === null ? name : `${name} (${formatPercent(run.overallAccuracy)})`;
}
