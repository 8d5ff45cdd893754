import type { Accuracy } from '../../../../shared/contracts/accuracy.ts';
import { ChartFrame } from '../../components/charts/chart-frame.tsx';
import { IntervalBar } from '../../components/charts/interval-bar.tsx';
import { ClassSwatch } from '../../components/ui/class-swatch.tsx';
import { Popover } from '../../components/ui/popover.tsx';
import { formatNumber } from '../../lib/format.ts';
import { ShareEstimate } from './share-estimate.tsx';
import { whyNoF1, whyNoProducers, whyNoUsers } from './undefined-reasons.ts';

interface ClassFiguresTableProps {
  accuracy: Accuracy;
  /** Place of each class in the scheme, in matrix order. */
  positions: readonly number[];
  fileName: string;
}

/** User's and producer's accuracy of each class with their intervals, F1, and what they rest on. */
export function ClassFiguresTable({ accuracy, positions, fileName }: ClassFiguresTableProps) {
  const { classes, perClass, unit } = accuracy;
  return (
    <ChartFrame
      title="How far each class can be trusted"
      note="User’s: of what is mapped as the class, the share that is. Producer’s: of what is the class, the share mapped so. The whisker is the 95 % interval."
      isTable
      fileName={fileName}
      data={{
        columns: COLUMNS,
        rows: perClass.map((row, index) => [
          classes[index]?.name,
          ...estimate(row.users),
          ...estimate(row.producers),
          row.f1,
          row.correctCount,
          row.mappedCount,
          row.referenceCount,
          row.heldOutPolygons,
          row.warning,
        ]),
      }}
    >
      <table className="w-full border-separate border-spacing-0 text-sm" aria-label="Figures of each class">
        <thead>
          <tr className="align-bottom text-ink-soft *:pb-1 *:font-medium">
            <th scope="col" className="text-left">
              Class
            </th>
            <th scope="col" colSpan={2} className="text-right max-sm:hidden">
              User’s accuracy
            </th>
            <th scope="col" className="text-right sm:hidden">
              User’s
            </th>
            <th scope="col" className="pl-2.5 text-right">
              Producer’s
            </th>
            <th scope="col" className="pl-2.5 text-right">
              F1
            </th>
            <th scope="col" className="pl-2.5 text-right">
              Right
              <span className="block text-2xs font-normal">
                of mapped,
                <br />
                of reference
              </span>
            </th>
            <th scope="col" className="pl-2.5 text-right max-sm:hidden">
              Poly-
              <br />
              gons
            </th>
          </tr>
        </thead>
        <tbody>
          {perClass.map((row, index) => {
            const landClass = classes[index];
            if (!landClass) return null;
            return (
              <tr key={row.classId} className="*:border-t *:border-line *:py-1.5">
                <th scope="row" className="pr-2 text-left font-normal sm:min-w-32">
                  <span className="flex items-start gap-2 leading-tight">
                    <ClassSwatch
                      size="sm"
                      colour={landClass.colour}
                      position={positions[index] ?? index}
                      className="mt-0.5"
                    />
                    <span>
                      {landClass.name}
                      {row.warning && <FewMark name={landClass.name} warning={row.warning} />}
                    </span>
                  </span>
                </th>
                <td className="w-[20%] min-w-12 max-sm:hidden">
                  <IntervalBar
                    value={percent(row.users.value)}
                    low={percent(row.users.low)}
                    high={percent(row.users.high)}
                    max={100}
                    colour={landClass.colour}
                    label={`${landClass.name}, user’s accuracy in %`}
                  />
                </td>
                <td className="pl-2.5 text-right whitespace-nowrap">
                  <ShareEstimate estimate={row.users} whyUndefined={whyNoUsers(unit)} />
                </td>
                <td className="pl-2.5 text-right whitespace-nowrap">
                  <ShareEstimate estimate={row.producers} whyUndefined={whyNoProducers(unit)} />
                </td>
                <td className="pl-2.5 text-right">
                  {row.f1 === null ? (
                    <>
                      undefined
                      <span className="block text-xs leading-tight text-ink-soft">{whyNoF1(row)}</span>
                    </>
                  ) : (
                    formatNumber(row.f1, 2)
                  )}
                </td>
                <td className="pl-2.5 text-right whitespace-nowrap">
                  {formatNumber(row.correctCount)}
                  <span className="block text-xs text-ink-soft">
                    of {formatNumber(row.mappedCount)}, of {formatNumber(row.referenceCount)}
                  </span>
                </td>
                <td className="pl-2.5 text-right max-sm:hidden">{formatNumber(row.heldOutPolygons)}</td>
              </tr>
            );
          })}
        </tbody>
      </table>
    </ChartFrame>
  );
}

const COLUMNS = [
  { name: 'class' },
  ...[
    'user’s accuracy',
    'user’s low',
    'user’s high',
    'producer’s accuracy',
    'producer’s low',
    'producer’s high',
    'F1',
  ].map((name) => ({ name, isNumber: true, decimals: 4 })),
  ...['correct', 'mapped', 'reference', 'held-out polygons'].map((name) => ({ name, isNumber: true })),
  { name: 'warning' },
];

function estimate({ value, low, high }: Accuracy['perClass'][number]['users']) {
  return [value, low, high];
}

function percent(share: number | null): number | null {
  return share === null ? null : share * 100;
}

function FewMark({ name, warning }: { name: string; warning: string }) {
  return (
    <Popover
      label={`Why ${name} is unsure`}
      trigger={
        <button type="button" className="link ml-1.5 text-xs text-ink-soft!" aria-label={`${name}: too few, why?`}>
          too few
        </button>
      }
    >
      {warning}
    </Popover>
  );
}
