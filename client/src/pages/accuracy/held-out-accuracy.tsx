import { Download } from 'lucide-react';
import { useSearchParams } from 'react-router-dom';
import { type AccuracyUnit, accuracyUnitSchema } from '../../../../shared/contracts/accuracy.ts';
import type { LandClass } from '../../../../shared/contracts/land-class.ts';
import type { Run } from '../../../../shared/contracts/run.ts';
import { buttonClass } from '../../components/ui/button.tsx';
import { ErrorState } from '../../components/ui/error-state.tsx';
import { PendingState } from '../../components/ui/pending-state.tsx';
import { Segmented } from '../../components/ui/segmented.tsx';
import { AccuracyReport } from '../../features/accuracy/accuracy-report.tsx';
import { useAccuracy } from '../../features/accuracy/get-accuracy.ts';
import { describeRecipe, runTitle } from '../../features/runs/recipe-text.ts';
import { apiUrl } from '../../lib/fetch-json.ts';
import { useProject } from '../../lib/project/project-context.ts';

/** What whole polygons the run never saw say of it, by pixel or by polygon. */
export function HeldOutAccuracy({ run, scheme }: { run: Run; scheme: readonly LandClass[] }) {
  const project = useProject();
  const [query, setQuery] = useSearchParams();
  const parsed = accuracyUnitSchema.safeParse(query.get('unit'));
  const unit: AccuracyUnit = parsed.success ? parsed.data : 'pixel';
  const accuracy = useAccuracy(project.id, run.id, unit);
  const choose = (next: AccuracyUnit) =>
    setQuery(
      (now) => {
        now.set('run', run.id);
        now.set('unit', next);
        return now;
      },
      { replace: true },
    );
  return (
    <>
      <div data-print="hide" className="mb-4 flex flex-wrap items-center gap-3">
        <Segmented<AccuracyUnit>
          label="Counted by"
          value={unit}
          onChange={choose}
          options={[
            { value: 'pixel', label: 'By pixel' },
            { value: 'polygon', label: 'By polygon' },
          ]}
        />
        <a
          href={apiUrl(`/runs/${run.id}/accuracy.csv`, { unit })}
          download
          className={buttonClass('secondary', 'sm')}
          aria-label="Download the figures as CSV"
        >
          <Download aria-hidden />
          CSV
        </a>
      </div>
      {accuracy.isPending && (
        <>
          <PendingState label="Loading the accuracy" rows={3} />
          <PendingState label="Loading the matrix" shape="table" rows={8} className="mt-10" />
        </>
      )}
      {accuracy.isError && !accuracy.data && (
        <ErrorState error={accuracy.error} onRetry={() => void accuracy.refetch()} />
      )}
      {accuracy.data && (
        <AccuracyReport
          key={`${accuracy.data.runId} ${accuracy.data.unit}`}
          projectId={project.id}
          accuracy={accuracy.data}
          runLine={[runTitle(run), run.name, run.sceneName, describeRecipe(run.recipe)].filter(Boolean).join(' · ')}
          runNumber={run.number}
          target={project.targetOverallAccuracy}
          scheme={scheme}
        />
      )}
    </>
  );
}
