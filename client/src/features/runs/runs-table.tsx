import { useMemo } from 'react';
import { Link, useNavigate } from 'react-router-dom';
import type { Run } from '../../../../shared/contracts/run.ts';
import { DataTable, type DataTableColumn } from '../../components/ui/data-table.tsx';
import { formatSince } from '../../lib/format-date.ts';
import { formatPercent, formatTimeLeft } from '../../lib/format.ts';
import { paths } from '../../lib/paths.ts';
import { CLASSIFIER_NAME } from './recipe-text.ts';
import { RunStateTag, isUnderWay, runStateText } from './run-state-tag.tsx';

interface RunsTableProps {
  runs: readonly Run[];
  /** Accuracy is for those who may read it. */
  showsAccuracy: boolean;
}

/** All runs; a row opens its run. */
export function RunsTable({ runs, showsAccuracy }: RunsTableProps) {
  const navigate = useNavigate();
  const columns = useMemo(
    () => (showsAccuracy ? COLUMNS : COLUMNS.filter((column) => column.id !== 'accuracy')),
    [showsAccuracy],
  );
  return (
    <DataTable
      label="Runs"
      rows={runs}
      columns={columns}
      rowId={(run) => run.id}
      rowHeight={48}
      maxHeight="none"
      initialSorting={[{ id: 'number', desc: true }]}
      filterPlaceholder="Filter runs"
      filterText={rowText}
      onRowClick={(run) => void navigate(paths.run(run.projectId, run.id))}
    />
  );
}

function rowText(run: Run): string {
  return [
    `run ${run.number}`,
    run.name,
    run.note,
    run.sceneName,
    CLASSIFIER_NAME[run.recipe.classifier.kind],
    runStateText(run.job.state),
    run.startedBy?.name,
  ].join(' ');
}

const COLUMNS: readonly DataTableColumn<Run>[] = [
  { id: 'number', header: 'Run', accessorFn: (run) => run.number, meta: { align: 'right', width: '3.5rem' } },
  {
    id: 'name',
    header: 'Name',
    accessorFn: (run) => run.name,
    cell: ({ row: { original: run } }) => (
      <Link
        to={paths.run(run.projectId, run.id)}
        onClick={(event) => event.stopPropagation()}
        className="font-medium text-ink hover:text-spruce hover:underline"
      >
        {run.name || <span className="font-normal text-ink-soft">unnamed</span>}
        <span className="sr-only">, run {run.number}</span>
      </Link>
    ),
  },
  { id: 'scene', header: 'Scene', accessorFn: (run) => run.sceneName },
  {
    id: 'classifier',
    header: 'Classifier',
    accessorFn: (run) => CLASSIFIER_NAME[run.recipe.classifier.kind],
    cell: ({ row: { original: run } }) => (
      <>
        {CLASSIFIER_NAME[run.recipe.classifier.kind]}
        <span className="block text-xs text-ink-soft">
          {run.recipe.bandIds.length} bands, {run.recipe.classIds.length} classes
        </span>
      </>
    ),
  },
  {
    id: 'state',
    header: 'State',
    accessorFn: (run) => runStateText(run.job.state),
    meta: { width: '11rem' },
    cell: ({ row: { original: run } }) => <RunState run={run} />,
  },
  {
    id: 'accuracy',
    header: 'Overall accuracy',
    accessorFn: (run) => run.overallAccuracy ?? -1,
    meta: { align: 'right', width: '9.5rem' },
    cell: ({ row: { original: run } }) => <RunAccuracy run={run} />,
  },
  { id: 'startedBy', header: 'Started by', accessorFn: (run) => run.startedBy?.name ?? '' },
  {
    id: 'createdAt',
    header: 'When',
    accessorFn: (run) => run.createdAt,
    meta: { width: '9rem' },
    cell: ({ row: { original: run } }) => <span className="text-ink-soft">{formatSince(run.createdAt)}</span>,
  },
];

function RunState({ run: { job } }: { run: Run }) {
  if (!isUnderWay(job)) return <RunStateTag job={job} />;
  const left = formatTimeLeft(job.secondsLeft);
  const text = `${job.step}, ${formatPercent(job.share)}`;
  return (
    <div>
      <p className="flex justify-between gap-2 text-xs">
        <span className="truncate">{job.step}</span>
        <span className="text-ink-soft">{formatPercent(job.share)}</span>
      </p>
      <div
        role="progressbar"
        aria-label="Progress of the run"
        aria-valuemin={0}
        aria-valuemax={100}
        aria-valuenow={Math.floor(job.share * 100)}
        aria-valuetext={left ? `${text}, ${left}` : text}
        className="mt-1 h-1.5 overflow-hidden rounded-full bg-line"
      >
        <div className="h-full rounded-full bg-groundsel-deep" style={{ width: `${job.share * 100}%` }} />
      </div>
    </div>
  );
}

function RunAccuracy({ run }: { run: Run }) {
  if (run.job.state !== 'finished') return <span className="text-ink-soft">–</span>;
  if (run.overallAccuracy === null) return <span className="text-ink-soft">undefined</span>;
  return (
    <>
      <span className="font-medium">{formatPercent(run.overallAccuracy, 1)}</span>
      <span className="block text-xs text-ink-soft">
        {run.overallLow === null || run.overallHigh === null
          ? 'no interval'
          : `${formatPercent(run.overallLow, 1)} to ${formatPercent(run.overallHigh, 1)}`}
      </span>
    </>
  );
}
