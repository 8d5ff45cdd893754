import type { Agreement, Design } from '../../../../shared/contracts/reference.ts';
import { ChartFrame } from '../../components/charts/chart-frame.tsx';
import { formatNumber } from '../../lib/format.ts';

interface ConfusedPair {
  one: string;
  other: string;
  points: number;
}

const MOST_SHOWN = 8;

/** Points where two interpreters gave two classes, by pair of classes, the most frequent first. */
export function listConfusedPairs(matrix: readonly (readonly number[])[], classes: Design['classes']): ConfusedPair[] {
  const pairs: ConfusedPair[] = [];
  for (let one = 0; one < matrix.length; one++) {
    for (let other = one + 1; other < matrix.length; other++) {
      const points = (matrix[one]?.[other] ?? 0) + (matrix[other]?.[one] ?? 0);
      if (points > 0) pairs.push({ one: classes[one]?.name ?? '', other: classes[other]?.name ?? '', points });
    }
  }
  return pairs.toSorted((a, b) => b.points - a.points);
}

/** The pairs of classes that the two interpreters with most points in common do not tell apart alike. */
export function ConfusedPairs({ matrix, design }: { matrix: NonNullable<Agreement['matrix']>; design: Design }) {
  const pairs = listConfusedPairs(matrix, design.classes);
  if (pairs.length === 0) return <p className="text-sm text-ink-soft">The two never gave different classes.</p>;
  return (
    <ChartFrame
      title="Classes not told apart"
      isTable
      note="Points where one said the first and the other the second. A clearer definition of the two may help."
      data={{
        columns: [{ name: 'Class' }, { name: 'Other class' }, { name: 'Points', isNumber: true }],
        rows: pairs.map(({ one, other, points }) => [one, other, points]),
      }}
    >
      <table className="w-full border-separate border-spacing-0 text-sm" aria-label="Classes not told apart">
        <thead>
          <tr className="text-left text-ink-soft *:pb-1 *:font-medium">
            <th scope="col">Class</th>
            <th scope="col">Other class</th>
            <th scope="col" className="text-right">
              Points
            </th>
          </tr>
        </thead>
        <tbody>
          {pairs.slice(0, MOST_SHOWN).map(({ one, other, points }) => (
            <tr key={`${one} ${other}`} className="*:border-t *:border-line *:py-1.5">
              <td>{one}</td>
              <td>{other}</td>
              <td className="text-right">{formatNumber(points)}</td>
            </tr>
          ))}
        </tbody>
      </table>
      {pairs.length > MOST_SHOWN && (
        <p className="mt-1 text-xs text-ink-soft">
          {formatNumber(pairs.length - MOST_SHOWN)} more pairs are in the saved table.
        </p>
      )}
    </ChartFrame>
  );
}
