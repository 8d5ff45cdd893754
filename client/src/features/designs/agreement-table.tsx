import type { ReactNode } from 'react';
import type { Agreement } from '../../../../shared/contracts/reference.ts';
import { ChartFrame } from '../../components/charts/chart-frame.tsx';
import { IntervalBar } from '../../components/charts/interval-bar.tsx';
import { HowComputed } from '../../components/figures/how-computed.tsx';
import { formatNumber } from '../../lib/format.ts';

export interface AgreementRow {
  name: string;
  /** Before the name. */
  swatch?: ReactNode;
  /** Bar's colour. */
  colour?: string;
  figure: Agreement['raw'];
  /** What the figure rests on. */
  n: number;
}

export interface AgreementTableProps {
  title: string;
  isTitleHidden?: boolean;
  note: string;
  /** Heading of the names: "Figure", "Class". */
  of: string;
  /** What is counted: "Points", "Answers". */
  unit: string;
  rows: readonly AgreementRow[];
}

const DECIMALS = 3;

/** Figures of agreement with their intervals, one a row; each says how it was computed. */
export function AgreementTable({ title, isTitleHidden = false, note, of, unit, rows }: AgreementTableProps) {
  return (
    <ChartFrame
      title={title}
      isTitleHidden={isTitleHidden}
      isTable
      note={note}
      data={{
        columns: [
          { name: of },
          { name: 'Value', isNumber: true, decimals: 4 },
          { name: 'Standard error', isNumber: true, decimals: 4 },
          { name: 'Low', isNumber: true, decimals: 4 },
          { name: 'High', isNumber: true, decimals: 4 },
          { name: unit, isNumber: true },
        ],
        rows: rows.map(({ name, figure, n }) => [
          ...[name, figure.value, figure.standardError, figure.low, figure.high, n],
        ]),
      }}
    >
      <table className="w-full border-separate border-spacing-0 text-sm" aria-label={title}>
        <thead>
          <tr className="text-ink-soft *:pb-1 *:pl-3 *:text-right *:font-medium">
            <th scope="col" className="pl-0! text-left!">
              {of}
            </th>
            <th scope="col">Value</th>
            <th scope="col">95 % interval</th>
            <th scope="col" className="w-2/5 text-left! max-md:hidden">
              0 to 1
            </th>
            <th scope="col">{unit}</th>
          </tr>
        </thead>
        <tbody>
          {rows.map(({ name, swatch, colour = 'var(--spruce)', figure, n }) => (
            <tr key={name} className="*:border-t *:border-line *:py-1.5 *:pl-3 *:text-right">
              <th scope="row" className="pl-0! text-left! font-normal">
                <span className="flex items-center gap-2">
                  {swatch}
                  <HowComputed name={name} how={figure.how} trigger={name} />
                </span>
              </th>
              <td className="font-medium">
                {figure.value === null ? 'undefined' : formatNumber(figure.value, DECIMALS)}
              </td>
              <td className="whitespace-nowrap">
                {figure.low === null || figure.high === null
                  ? figure.value === null
                    ? 'undefined'
                    : 'too few or all alike'
                  : `${formatNumber(figure.low, DECIMALS)} to ${formatNumber(figure.high, DECIMALS)}`}
              </td>
              <td className="max-md:hidden">
                <IntervalBar
                  label={name}
                  value={figure.value}
                  low={figure.low}
                  high={figure.high}
                  max={1}
                  colour={colour}
                  decimals={DECIMALS}
                />
              </td>
              <td>{formatNumber(n)}</td>
            </tr>
          ))}
        </tbody>
      </table>
    </ChartFrame>
  );
}
