import type { DesignPlan } from '../../../../shared/contracts/reference.ts';
import { ChartFrame } from '../../components/charts/chart-frame.tsx';
import { IntervalBar } from '../../components/charts/interval-bar.tsx';
import { ClassSwatch } from '../../components/ui/class-swatch.tsx';
import { formatHectares, formatNumber, formatPercent } from '../../lib/format.ts';

export interface StrataTableProps {
  strata: DesignPlan['strata'];
  /** Place in the scheme by class id, for the patterns. */
  positions: ReadonlyMap<string, number>;
}

/** Each stratum's share of the map, its points, and the interval its user's accuracy may be expected to have. */
export function StrataTable({ strata, positions }: StrataTableProps) {
  const nPoints = strata.reduce((sum, { points }) => sum + points, 0);
  return (
    <ChartFrame
      title="Points of each stratum"
      isTitleHidden
      isTable
      note="The whisker is the 95 % interval to expect of user’s accuracy, if it is as you expect."
      data={{
        columns: [
          { name: 'Stratum' },
          { name: 'Pixels', isNumber: true },
          { name: 'Area, ha', isNumber: true, decimals: 2 },
          { name: 'Share', isNumber: true, decimals: 6 },
          { name: 'Points', isNumber: true },
          { name: 'Expected user’s accuracy', isNumber: true, decimals: 4 },
          { name: 'Low', isNumber: true, decimals: 4 },
          { name: 'High', isNumber: true, decimals: 4 },
        ],
        rows: strata.map((one) => [
          one.name,
          one.pixels,
          one.areaHa,
          one.share,
          one.points,
          one.expectedUsers,
          one.expectedLow,
          one.expectedHigh,
        ]),
      }}
    >
      <div className="overflow-x-auto">
        <table className="w-full border-separate border-spacing-0 text-sm" aria-label="Points of each stratum">
          <thead>
            <tr className="text-ink-soft *:pb-1 *:pl-3 *:text-right *:font-medium">
              <th scope="col" className="pl-0! text-left!">
                Stratum
              </th>
              <th scope="col">Mapped</th>
              <th scope="col">Share</th>
              <th scope="col">Points</th>
              <th scope="col" className="w-[30%]">
                Expected user’s accuracy
              </th>
              <th scope="col" />
            </tr>
          </thead>
          <tbody>
            {strata.map((one) => (
              <tr key={one.code} className="*:border-t *:border-line *:py-1.5 *:pl-3 *:text-right">
                <th scope="row" className="pl-0! text-left! font-normal">
                  <span className="flex items-center gap-2">
                    <ClassSwatch
                      size="sm"
                      colour={one.colour}
                      position={(one.classId && positions.get(one.classId)) || 0}
                    />
                    {one.name}
                  </span>
                </th>
                <td className="whitespace-nowrap">{formatHectares(one.areaHa)}</td>
                <td className="whitespace-nowrap">{formatPercent(one.share, 1)}</td>
                <td className="font-medium">{formatNumber(one.points)}</td>
                <td>
                  <IntervalBar
                    value={percent(one.expectedUsers)}
                    low={percent(one.expectedLow)}
                    high={percent(one.expectedHigh)}
                    max={100}
                    colour={one.colour}
                    label={`${one.name}, expected user’s accuracy in %`}
                  />
                </td>
                <td className="whitespace-nowrap">
                  {one.expectedLow === null || one.expectedHigh === null
                    ? 'undefined'
                    : `${formatNumber(one.expectedLow * 100)} to ${formatPercent(one.expectedHigh)}`}
                </td>
              </tr>
            ))}
          </tbody>
          <tfoot>
            <tr className="*:border-t *:border-edge *:py-1.5 *:pl-3 *:text-right *:font-medium">
              <th scope="row" className="pl-0! text-left!">
                Together
              </th>
              <td className="whitespace-nowrap">
                {formatHectares(strata.reduce((sum, { areaHa }) => sum + areaHa, 0))}
              </td>
              <td />
              <td>{formatNumber(nPoints)}</td>
              <td />
              <td />
            </tr>
          </tfoot>
        </table>
      </div>
    </ChartFrame>
  );
}

function percent(share: number | null): number | null {
  return share === null ? null : share * 100;
}
