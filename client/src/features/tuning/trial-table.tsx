import { Link } from 'react-router-dom';
import type { Tuning, TuningTrial } from '../../../../shared/contracts/tuning.ts';
import { DataTable, type DataTableColumn } from '../../components/ui/data-table.tsx';
import { buttonClass } from '../../components/ui/button.tsx';
import { formatDuration, formatPercent } from '../../lib/format.ts';
import { paths } from '../../lib/paths.ts';
import { printValue, settingLabel } from './tuning-settings.ts';

/** What came of each trial; the best first. */
export function TrialTable({ tuning }: { tuning: Tuning }) {
  const { plan, recipe, bestTrial, projectId, id } = tuning;
  const columns: DataTableColumn<TuningTrial>[] = [
    {
      id: 'number',
      header: 'Trial',
      accessorFn: (trial) => trial.number,
      meta: { align: 'right', width: '4rem' },
      cell: ({ row: { original: trial } }) => (
        <>
          {trial.number}
          {trial.number === bestTrial && <span className="block text-xs font-medium text-spruce">best</span>}
        </>
      ),
    },
    ...plan.ranges.map(({ parameter }, index): DataTableColumn<TuningTrial> => ({
      id: parameter,
      header: settingLabel(recipe.classifier.kind, parameter),
      accessorFn: (trial) => printValue(trial.values[index] ?? null),
      meta: { align: 'right' },
    })),
    {
      id: 'mean',
      header: 'Accuracy over folds',
      accessorFn: (trial) => trial.meanAccuracy ?? -1,
      meta: { align: 'right', width: '10rem' },
      cell: ({ row: { original: trial } }) =>
        trial.error ? (
          <span className="text-rust">{trial.error}</span>
        ) : (
          <>
            <span className="font-medium">{formatPercent(trial.meanAccuracy, 1)}</span>
            <span className="block text-xs text-ink-soft">
              {trial.spread === null ? 'no spread' : `spread ${formatPercent(trial.spread, 1)}`}
            </span>
          </>
        ),
    },
    {
      id: 'producers',
      header: 'Mean over classes',
      accessorFn: (trial) => trial.meanProducersAccuracy ?? -1,
      meta: { align: 'right', width: '9rem' },
      cell: ({ row: { original: trial } }) => formatPercent(trial.meanProducersAccuracy, 1),
    },
    {
      id: 'seconds',
      header: 'Time',
      accessorFn: (trial) => trial.seconds,
      meta: { align: 'right', width: '6rem' },
      cell: ({ row: { original: trial } }) => <span className="text-ink-soft">{formatDuration(trial.seconds)}</span>,
    },
    {
      id: 'use',
      header: 'Use',
      enableSorting: false,
      meta: { align: 'right', width: '10.5rem' },
      cell: ({ row: { original: trial } }) =>
        trial.error === null && (
          <Link
            to={paths.newRunByTrial(projectId, id, trial.number)}
            className={buttonClass('secondary', 'sm')}
            aria-label={`Use the settings of trial ${trial.number}`}
          >
            Use these settings
          </Link>
        ),
    },
  ];
  return (
    <DataTable
      label="Trials"
      rows={tuning.trials}
      columns={columns}
      rowId={(trial) => String(trial.number)}
      rowHeight={48}
      maxHeight="none"
      initialSorting={[{ id: 'mean', desc: true }]}
      empty={<p className="text-ink-soft">No trial has been judged yet.</p>}
    />
  );
}
