import { X } from 'lucide-react';
import { type ReactNode, useEffect, useRef, useState } from 'react';
import type { CellPoint, Estimates } from '../../../../shared/contracts/reference.ts';
import type { MatrixCell } from '../../components/charts/confusion-matrix-table.tsx';
import { ErrorState } from '../../components/ui/error-state.tsx';
import { IconButton } from '../../components/ui/icon-button.tsx';
import { PendingState } from '../../components/ui/pending-state.tsx';
import { classNames } from '../../lib/class-names.ts';
import { formatCoordinates } from '../../lib/format-coordinates.ts';
import { formatCount } from '../../lib/format.ts';
import { useCellPoints } from './get-cell-points.ts';

export interface CellPointsProps {
  projectId: string;
  estimates: Estimates;
  cell: MatrixCell;
  onClose: () => void;
  /** Pictures and spectra of a point. */
  renderPlace: (point: CellPoint) => ReactNode;
}

/** The reference points behind a cell: a list, and the chosen one in pictures with its spectrum. */
export function CellPoints({ projectId, estimates, cell, onClose, renderPlace }: CellPointsProps) {
  const mapped = estimates.columns[cell.mappedIndex];
  const reference = estimates.columns[cell.referenceIndex];
  const ref = useRef<HTMLElement>(null);
  useEffect(() => {
    ref.current?.scrollIntoView({ block: 'nearest' });
  }, [cell]);
  if (!mapped || !reference) return null;
  const isRight = mapped.id === reference.id;
  return (
    <section
      ref={ref}
      aria-labelledby="cell-points"
      data-print="hide"
      className="appear rounded-xl border border-line bg-card px-4 py-3 text-sm"
    >
      <div className="flex items-start gap-3">
        <h3 id="cell-points" className="grow font-semibold">
          {isRight ? `${mapped.name}, mapped rightly` : `Mapped as ${mapped.name}, really ${reference.name}`}
        </h3>
        <IconButton label="Close" size="sm" icon={<X />} onClick={onClose} />
      </div>
      <PointList
        key={`${mapped.id} ${reference.id}`}
        projectId={projectId}
        cell={{ designId: estimates.designId, mappedCode: mapped.code, referenceId: reference.id }}
        renderPlace={renderPlace}
      />
    </section>
  );
}

interface PointListProps extends Pick<CellPointsProps, 'projectId' | 'renderPlace'> {
  cell: Parameters<typeof useCellPoints>[1];
}

function PointList({ projectId, cell, renderPlace }: PointListProps) {
  const points = useCellPoints(projectId, cell);
  const [chosenId, setChosenId] = useState<string | null>(null);
  if (points.isPending) return <PendingState label="Loading the points" rows={3} className="mt-2" />;
  if (points.isError) {
    return <ErrorState error={points.error} onRetry={() => void points.refetch()} isInline className="mt-2" />;
  }
  const list = points.data.points;
  const chosen = list.find(({ id }) => id === chosenId) ?? list[0];
  if (!chosen) return <p className="mt-2">No reference point is behind this cell.</p>;
  return (
    <>
      <p className="text-ink-soft">{formatCount(list.length, 'point')}</p>
      <div className="mt-2 grid gap-4 lg:grid-cols-[13rem_minmax(0,1fr)]">
        <ul className="max-h-80 overflow-y-auto border-t border-line">
          {list.map((point) => (
            <li key={point.id} className="border-b border-line">
              <button
                type="button"
                aria-pressed={point.id === chosen.id}
                onClick={() => setChosenId(point.id)}
                className={classNames(
                  'focus-inset w-full px-2 py-1 text-left',
                  point.id === chosen.id ? 'bg-groundsel-wash font-medium' : 'hover:bg-sunken',
                )}
              >
                Point {point.number}
                <span className="block text-xs font-normal text-ink-soft">
                  {formatCoordinates(point.position[1], point.position[0])}
                  {point.settledBy === 'decision' && ' · decided'}
                </span>
              </button>
            </li>
          ))}
        </ul>
        <div className="min-w-0">
          {renderPlace(chosen)}
          {chosen.answers.some(({ note }) => note) && (
            <ul className="mt-2 text-ink-soft">
              {chosen.answers.flatMap(({ note, by }, place) =>
                note ? [<li key={place}>{`${by?.name ?? 'Someone'}: ${note}`}</li>] : [],
              )}
            </ul>
          )}
        </div>
      </div>
    </>
  );
}
