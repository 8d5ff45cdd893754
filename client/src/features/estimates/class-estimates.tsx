import type { DesignFigure, Estimates } from '../../../../shared/contracts/reference.ts';
import { ChartFrame } from '../../components/charts/chart-frame.tsx';
import { IntervalBar } from '../../components/charts/interval-bar.tsx';
import { HowComputed } from '../../components/figures/how-computed.tsx';
import { ClassSwatch } from '../../components/ui/class-swatch.tsx';
import { Popover } from '../../components/ui/popover.tsx';
import { figureParts, quotedInterval } from './figure-text.ts';

export interface ClassEstimatesProps {
  estimates: Estimates;
  positions: ReadonlyMap<string, number>;
}

/** User's and producer's accuracy and F1 of each class, with the intervals to quote. */
export function ClassEstimates({ estimates, positions }: ClassEstimatesProps) {
  return (
    <ChartFrame
      title="How far each class can be trusted"
      note="User’s: of what is mapped as the class, the share that is. Producer’s: of what is the class, the share mapped so. In small print the 95 % interval; where points are few, the cautious one."
      isTable
      data={{
        columns: [
          { name: 'Class' },
          ...['User’s accuracy', 'User’s low', 'User’s high'].map((name) => ({ name, isNumber: true, decimals: 4 })),
          ...['Producer’s accuracy', 'Producer’s low', 'Producer’s high'].map((name) => ({
            name,
            isNumber: true,
            decimals: 4,
          })),
          ...['F1', 'F1 low', 'F1 high'].map((name) => ({ name, isNumber: true, decimals: 4 })),
          { name: 'Mapped points', isNumber: true },
          { name: 'Reference points', isNumber: true },
          { name: 'Warning' },
        ],
        rows: estimates.perClass.map((row) => [
          row.name,
          ...[row.users, row.producers, row.f1].flatMap(cells),
          row.mappedPoints,
          row.referencePoints,
          row.warning,
        ]),
      }}
    >
      <div className="overflow-x-auto">
        <table className="w-full border-separate border-spacing-0 text-sm" aria-label="Estimates of each class">
          <thead>
            <tr className="text-ink-soft *:pb-1 *:pl-3 *:text-right *:font-medium">
              <th scope="col" className="pl-0! text-left!">
                Class
              </th>
              <th scope="col" className="w-[16%] max-sm:hidden" aria-label="User’s accuracy, drawn" />
              <th scope="col">User’s accuracy</th>
              <th scope="col">Producer’s accuracy</th>
              <th scope="col">F1</th>
              <th scope="col">Points</th>
            </tr>
          </thead>
          <tbody>
            {estimates.perClass.map((row) => {
              const users = quotedInterval(row.users);
              return (
                <tr key={row.classId} className="*:border-t *:border-line *:py-1.5 *:pl-3 *:text-right">
                  <th scope="row" className="pl-0! text-left! font-normal">
                    <span className="flex items-center gap-2">
                      <ClassSwatch size="sm" colour={row.colour} position={positions.get(row.classId) ?? 0} />
                      <span>
                        {row.name}
                        {row.warning && (
                          <Popover
                            label={`Why ${row.name} is unsure`}
                            trigger={
                              <button
                                type="button"
                                className="link ml-1.5 text-xs text-ink-soft!"
                                aria-label={`${row.name}: few points, why?`}
                              >
                                few points
                              </button>
                            }
                          >
                            {row.warning}
                          </Popover>
                        )}
                      </span>
                    </span>
                  </th>
                  <td className="max-sm:hidden">
                    <IntervalBar
                      value={percent(row.users.value)}
                      low={percent(users?.low ?? null)}
                      high={percent(users?.high ?? null)}
                      max={100}
                      colour={row.colour}
                      label={`${row.name}, user’s accuracy in %`}
                    />
                  </td>
                  <FigureCell name={`User’s accuracy of ${row.name}`} figure={row.users} />
                  <FigureCell name={`Producer’s accuracy of ${row.name}`} figure={row.producers} />
                  <FigureCell name={`F1 of ${row.name}`} figure={row.f1} isShare={false} />
                  <td className="whitespace-nowrap">
                    {row.mappedPoints}
                    <span className="block text-xs text-ink-soft">{row.referencePoints} of reference</span>
                  </td>
                </tr>
              );
            })}
          </tbody>
        </table>
      </div>
    </ChartFrame>
  );
}

function FigureCell({ name, figure, isShare = true }: { name: string; figure: DesignFigure; isShare?: boolean }) {
  const { value, interval } = figureParts(figure, isShare);
  return (
    <td className="whitespace-nowrap">
      <HowComputed name={name} how={figure.how} trigger={value} />
      {interval && <span className="block text-xs text-ink-soft">{interval}</span>}
    </td>
  );
}

function cells(figure: DesignFigure) {
  const interval = quotedInterval(figure);
  return [figure.value, interval?.low ?? null, interval?.high ?? null];
}

function percent(share: number | null): number | null {
  return share === null ? null : share * 100;
}
