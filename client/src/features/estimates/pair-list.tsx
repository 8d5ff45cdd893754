import type { Estimates } from '../../../../shared/contracts/reference.ts';
import type { MatrixCell } from '../../components/charts/confusion-matrix-table.tsx';
import { formatCount, formatHectares, formatPercent } from '../../lib/format.ts';
import { costlyPairs } from './costly-pairs.ts';

export interface PairListProps {
  estimates: Estimates;
  onCell: (cell: MatrixCell) => void;
}

/** The mistakes that take most of the area, and what would help. */
export function PairList({ estimates, onCell }: PairListProps) {
  const pairs = costlyPairs(estimates);
  const { rows, columns } = estimates;
  if (pairs.length === 0) return <p className="text-sm text-ink-soft">No point was found to be mapped wrongly.</p>;
  return (
    <ol className="divide-y divide-line border-y border-line text-sm">
      {pairs.map((pair) => {
        const mapped = rows[pair.mappedIndex];
        const reference = columns[pair.referenceIndex];
        if (!mapped || !reference) return null;
        const mappedIndex = columns.findIndex(({ id }) => id === mapped.classId);
        const text = (
          <>
            <span className="font-medium">
              Mapped as {mapped.name}, really {reference.name}
            </span>
            <span className="block text-ink-soft">
              {formatHectares(pair.areaHa)}, {formatPercent(pair.share, 1)} of the map, from{' '}
              {formatCount(pair.points, 'point')}. {advise(mapped.classId === null)}
            </span>
          </>
        );
        return (
          <li key={`${pair.mappedIndex} ${pair.referenceIndex}`}>
            {mappedIndex < 0 ? (
              <div className="px-1 py-2">{text}</div>
            ) : (
              <button
                type="button"
                className="focus-inset w-full px-1 py-2 text-left hover:bg-sunken"
                onClick={() => onCell({ mappedIndex, referenceIndex: pair.referenceIndex })}
              >
                {text}
              </button>
            )}
          </li>
        );
      })}
    </ol>
  );
}

function advise(isUnclassified: boolean): string {
  return isUnclassified
    ? 'A lower limit for leaving pixels unclassified would map more of it.'
    : 'Look at the places: training samples of both where they meet would help most.';
}
