import type { Estimates } from '../../../../shared/contracts/reference.ts';
import { IntervalChart } from '../../components/charts/interval-chart.tsx';
import { HowComputed } from '../../components/figures/how-computed.tsx';
import { ClassSwatch } from '../../components/ui/class-swatch.tsx';
import { formatNumber } from '../../lib/format.ts';
import { halfWidth, quotedInterval } from './figure-text.ts';

export interface AreaPartProps {
  estimates: Estimates;
  positions: ReadonlyMap<string, number>;
}

/** How much of each class there is: estimated with its interval, and counted on the map beside it. */
export function AreaPart({ estimates, positions }: AreaPartProps) {
  const { perClass, runId } = estimates;
  return (
    <div className="space-y-6">
      <IntervalChart
        title="Area of each class"
        note="Bars: estimated from the reference points, with 95 % intervals. Rust ticks: pixels counted on the map, which adds up its mistakes."
        axisLabel="area, ha"
        tickLabel="Counted on the map, ha"
        fileName={`areas of run ${runId.slice(0, 8)}`}
        rows={perClass.map(({ classId, name, colour, areaHa, mappedAreaHa }) => {
          const interval = quotedInterval(areaHa);
          return {
            ...{ id: classId, name, colour, value: areaHa.value },
            low: interval?.low ?? null,
            high: interval?.high ?? null,
            tick: mappedAreaHa,
          };
        })}
      />
      <div className="overflow-x-auto">
        <table className="w-full border-separate border-spacing-0 text-sm" aria-label="Areas of the classes">
          <thead>
            <tr className="text-ink-soft *:pb-1 *:pl-3 *:text-right *:font-medium">
              <th scope="col" className="pl-0! text-left!">
                Class
              </th>
              <th scope="col">Estimated, ha</th>
              <th scope="col" className="max-sm:hidden">
                95 % interval, ha
              </th>
              <th scope="col">On the map, ha</th>
              <th scope="col">Difference, ha</th>
            </tr>
          </thead>
          <tbody>
            {perClass.map((row) => {
              const interval = quotedInterval(row.areaHa);
              const half = halfWidth(row.areaHa);
              return (
                <tr key={row.classId} className="*:border-t *:border-line *:py-1.5 *:pl-3 *:text-right">
                  <th scope="row" className="pl-0! text-left! font-normal">
                    <span className="flex items-center gap-2">
                      <ClassSwatch size="sm" colour={row.colour} position={positions.get(row.classId) ?? 0} />
                      {row.name}
                    </span>
                  </th>
                  <td className="whitespace-nowrap">
                    <HowComputed
                      name={`Area of ${row.name}`}
                      how={row.areaHa.how}
                      trigger={
                        row.areaHa.value === null
                          ? 'undefined'
                          : `${formatNumber(row.areaHa.value)}${half === null || row.areaHa.isFragile ? '' : ` ± ${formatNumber(half)}`}`
                      }
                    />
                  </td>
                  <td className="whitespace-nowrap max-sm:hidden">
                    {interval ? `${formatNumber(interval.low)} to ${formatNumber(interval.high)}` : 'undefined'}
                    {row.areaHa.isFragile && interval && ' (few points)'}
                  </td>
                  <td>{formatNumber(row.mappedAreaHa)}</td>
                  <td>
                    {row.differenceHa === null
                      ? 'undefined'
                      : `${row.differenceHa > 0 ? '+' : ''}${formatNumber(row.differenceHa)}`}
                  </td>
                </tr>
              );
            })}
          </tbody>
        </table>
      </div>
      <p className="text-sm text-ink-soft">
        A pixel counts with the grid’s own area where its projection keeps areas to within 1 %, and otherwise with its
        true area on the ellipsoid, row by row; the run’s notes say which. Counting pixels takes every mistake of the
        map as right; the estimate corrects for it (Olofsson et al. 2014).
      </p>
    </div>
  );
}
