import { Plus } from 'lucide-react';
import { Link } from 'react-router-dom';
import type { Tuning } from '../../../../shared/contracts/tuning.ts';
import { PageHeader } from '../../components/layout/page-header.tsx';
import { ReadingPage } from '../../components/layout/reading-page.tsx';
import { ForbiddenState } from '../../components/ui/access-states.tsx';
import { buttonClass } from '../../components/ui/button.tsx';
import { EmptyState } from '../../components/ui/empty-state.tsx';
import { ErrorState } from '../../components/ui/error-state.tsx';
import { PendingState } from '../../components/ui/pending-state.tsx';
import { CLASSIFIER_NAME } from '../../features/runs/recipe-text.ts';
import { RunStateTag } from '../../features/runs/run-state-tag.tsx';
import { useTunings } from '../../features/tuning/tuning-queries.ts';
import { formatSince } from '../../lib/format-date.ts';
import { formatCount, formatPercent } from '../../lib/format.ts';
import { paths } from '../../lib/paths.ts';
import { useProject } from '../../lib/project/project-context.ts';

/** Searches for the settings of a classifier. */
export function TuningsPage() {
  const { abilities } = useProject();
  if (!abilities.startRuns) {
    return (
      <ReadingPage header={<PageHeader title="Tuning" />}>
        <ForbiddenState>Leads and modellers tune classifiers. Your project lead gives out roles.</ForbiddenState>
      </ReadingPage>
    );
  }
  return <TuningList />;
}

function TuningList() {
  const { id } = useProject();
  const tunings = useTunings(id);
  const list = tunings.data ?? [];
  return (
    <ReadingPage
      header={
        <PageHeader
          title="Tuning"
          action={
            <Link to={paths.newTuning(id)} className={buttonClass('primary')}>
              <Plus aria-hidden />
              New search
            </Link>
          }
        >
          <Link to={paths.runs(id)} className="link text-sm">
            All runs
          </Link>
        </PageHeader>
      }
    >
      {tunings.isPending && <PendingState label="Loading searches" rows={4} />}
      {tunings.isError && !tunings.data && <ErrorState error={tunings.error} onRetry={() => void tunings.refetch()} />}
      {tunings.data && list.length === 0 && (
        <EmptyState title="No search yet">
          A search tries settings of a classifier on the training samples, fold by fold, and shows which do best.
          Held-out samples take no part.
        </EmptyState>
      )}
      {list.length > 0 && (
        <ul className="divide-y divide-line rounded-xl border border-line bg-card">
          {list.map((tuning) => (
            <TuningRow key={tuning.id} tuning={tuning} />
          ))}
        </ul>
      )}
    </ReadingPage>
  );
}

function TuningRow({ tuning }: { tuning: Tuning }) {
  const { id, projectId, name, recipe, trials, bestTrial, job, startedBy, createdAt } = tuning;
  const best = trials.find(({ number }) => number === bestTrial);
  return (
    <li className="flex flex-wrap items-center gap-x-5 gap-y-1 px-4 py-3">
      <span className="min-w-56 grow">
        <Link to={paths.tuning(projectId, id)} className="font-medium text-ink hover:text-spruce hover:underline">
          {name || `Search of ${startedBy?.name ?? 'someone who left'}`}
        </Link>
        <span className="block text-sm text-ink-soft">
          {CLASSIFIER_NAME[recipe.classifier.kind]}, {formatCount(trials.length, 'trial')}, {formatSince(createdAt)}
        </span>
      </span>
      {best && (
        <span className="text-sm">
          best {formatPercent(best.meanAccuracy, 1)}
          <span className="text-ink-soft"> in training folds</span>
        </span>
      )}
      {job && <RunStateTag job={job} />}
    </li>
  );
}
