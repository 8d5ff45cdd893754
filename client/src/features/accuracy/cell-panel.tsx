import { X } from 'lucide-react';
import { useEffect, useRef } from 'react';
import { Link } from 'react-router-dom';
import type { Accuracy, CellSamples } from '../../../../shared/contracts/accuracy.ts';
import type { MatrixCell } from '../../components/charts/confusion-matrix-table.tsx';
import { ErrorState } from '../../components/ui/error-state.tsx';
import { IconButton } from '../../components/ui/icon-button.tsx';
import { PendingState } from '../../components/ui/pending-state.tsx';
import { formatCount, formatNumber } from '../../lib/format.ts';
import { paths } from '../../lib/paths.ts';
import { UNIT_NOUN } from './describe-accuracy.ts';
import { useCellSamples } from './get-cell-samples.ts';

interface CellPanelProps {
  projectId: string;
  accuracy: Accuracy;
  cell: MatrixCell;
  onClose: () => void;
}

/** The held-out samples behind a cell, with the way to each on the map. */
export function CellPanel({ projectId, accuracy, cell, onClose }: CellPanelProps) {
  const { classes, matrix, unit } = accuracy;
  const mapped = classes[cell.mappedIndex];
  const reference = classes[cell.referenceIndex];
  const ref = useRef<HTMLElement>(null);
  useEffect(() => {
    ref.current?.scrollIntoView({ block: 'nearest' });
  }, [cell]);
  if (!mapped || !reference) return null;
  const count = matrix[cell.mappedIndex]?.[cell.referenceIndex] ?? 0;
  const isRight = cell.mappedIndex === cell.referenceIndex;
  return (
    <section
      ref={ref}
      aria-labelledby="cell-panel"
      data-print="hide"
      className="appear rounded-xl border border-line bg-card px-4 py-3 text-sm"
    >
      <div className="flex items-start gap-3">
        <div className="grow">
          <h3 id="cell-panel" className="font-semibold">
            {isRight ? (
              <>{mapped.name}, mapped rightly</>
            ) : (
              <>
                Mapped as {mapped.name}, really {reference.name}
              </>
            )}
          </h3>
          <p className="text-ink-soft">{formatCount(count, `held-out ${UNIT_NOUN[unit].one}`)}</p>
        </div>
        <IconButton label="Close" size="sm" icon={<X />} onClick={onClose} />
      </div>
      {count === 0 ? (
        <p className="mt-2">No held-out sample is behind this cell.</p>
      ) : (
        <SampleList
          projectId={projectId}
          cell={{ runId: accuracy.runId, unit, mappedId: mapped.id, referenceId: reference.id }}
          mappedName={mapped.name}
        />
      )}
    </section>
  );
}

interface SampleListProps {
  projectId: string;
  cell: Parameters<typeof useCellSamples>[1];
  mappedName: string;
}

function SampleList({ projectId, cell, mappedName }: SampleListProps) {
  const samples = useCellSamples(projectId, cell);
  if (samples.isPending) return <PendingState label="Loading samples" shape="table" rows={3} className="mt-2" />;
  if (samples.isError) {
    return <ErrorState error={samples.error} onRetry={() => void samples.refetch()} isInline className="mt-2" />;
  }
  const list = samples.data.samples;
  const there = list.filter(({ stillThere }) => stillThere).map(({ sampleId }) => sampleId);
  return (
    <>
      <ul className="mt-2 max-h-60 overflow-y-auto border-t border-line">
        {list.map((sample) => (
          <SampleRow key={sample.sampleId} projectId={projectId} sample={sample} mappedName={mappedName} />
        ))}
      </ul>
      {there.length > 0 && (
        <p className="mt-2">
          <Link to={paths.samplesChosen(projectId, there)} className="link">
            {there.length === 1 ? 'Show it on the sampling desk' : `Show all ${there.length} on the sampling desk`}
          </Link>
        </p>
      )}
    </>
  );
}

function SampleRow({
  projectId,
  sample,
  mappedName,
}: {
  projectId: string;
  sample: CellSamples['samples'][number];
  mappedName: string;
}) {
  return (
    <li className="flex items-baseline gap-3 border-b border-line py-1">
      {sample.stillThere ? (
        <Link to={paths.samplesChosen(projectId, [sample.sampleId])} className="link font-medium">
          Sample {sample.number}
        </Link>
      ) : (
        <span>
          Sample {sample.number} <span className="text-ink-soft">(deleted since)</span>
        </span>
      )}
      <span className="ml-auto text-right text-ink-soft">
        {formatNumber(sample.pixels)} of {formatCount(sample.pixelsOfSample, 'pixel')} mapped as {mappedName}
      </span>
    </li>
  );
}
