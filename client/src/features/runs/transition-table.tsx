import { useState } from 'react';
import type { RunComparison } from '../../../../shared/contracts/run-comparison.ts';
import { ChartFrame } from '../../components/charts/chart-frame.tsx';
import { Checkbox } from '../../components/ui/checkbox.tsx';
import { formatNumber, formatPercent } from '../../lib/format.ts';

const UNMAPPED = 'Not mapped';

/** What each class of the first map is on the second, the largest differences first. */
export function TransitionTable({ comparison }: { comparison: RunComparison }) {
  const [showsSame, setShowsSame] = useState(false);
  const names = new Map(comparison.classes.map(({ id, name }) => [id, name]));
  const nameOf = (id: string | null) => (id === null ? UNMAPPED : (names.get(id) ?? UNMAPPED));
  const { transitions } = comparison;
  const total = transitions.reduce((sum, { areaHa }) => sum + areaHa, 0);
  const rows = transitions.filter(({ fromClassId, toClassId }) => showsSame || fromClassId !== toClassId);
  return (
    <ChartFrame
      title="From one map to the other"
      note={`Rows are the class on run ${comparison.first.number}, then the class on run ${comparison.second.number}; areas by counting pixels.`}
      isTable
      data={{
        columns: [
          { name: `Run ${comparison.first.number}` },
          { name: `Run ${comparison.second.number}` },
          { name: 'Pixels', isNumber: true },
          { name: 'Area, ha', isNumber: true, decimals: 2 },
        ],
        rows: transitions.map((one) => [nameOf(one.fromClassId), nameOf(one.toClassId), one.pixels, one.areaHa]),
      }}
    >
      <Checkbox isChecked={showsSame} onChange={setShowsSame} label="Also what is the same on both" />
      {rows.length === 0 ? (
        <p className="mt-3">The maps are the same everywhere.</p>
      ) : (
        <div className="mt-3 max-h-120 overflow-auto">
          <table className="w-full text-sm" aria-label="What each class became">
            <thead>
              <tr className="text-xs text-ink-soft *:border-b *:border-edge *:py-1 *:font-medium">
                <th scope="col" className="text-left">{`On run ${comparison.first.number}`}</th>
                <th scope="col" className="text-left">{`On run ${comparison.second.number}`}</th>
                <th scope="col" className="text-right">
                  Pixels
                </th>
                <th scope="col" className="text-right">
                  Area, ha
                </th>
                <th scope="col" className="text-right">
                  Share
                </th>
              </tr>
            </thead>
            <tbody>
              {rows.map((one) => (
                <tr key={`${one.fromClassId} ${one.toClassId}`} className="*:border-b *:border-line *:py-1">
                  <td>{nameOf(one.fromClassId)}</td>
                  <td>{nameOf(one.toClassId)}</td>
                  <td className="text-right">{formatNumber(one.pixels)}</td>
                  <td className="text-right">{formatNumber(one.areaHa, one.areaHa < 100 ? 1 : 0)}</td>
                  <td className="text-right">{formatPercent(total > 0 ? one.areaHa / total : 0, 1)}</td>
                </tr>
              ))}
            </tbody>
          </table>
        </div>
      )}
    </ChartFrame>
  );
}
