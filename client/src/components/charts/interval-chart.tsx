import { max } from 'd3-array';
import { scaleLinear } from 'd3-scale';
import type { ReactNode } from 'react';
import { formatNumber } from '../../lib/format.ts';
import { useWidth } from '../../lib/use-width.ts';
import { ChartFrame } from './chart-frame.tsx';

export interface IntervalRow {
  id: string;
  name: string;
  colour: string;
  value: number | null;
  low: number | null;
  high: number | null;
  /** Another reading to compare. */
  tick?: number | null;
  /** What the value rests on, printed at the right: "n = 58". */
  note?: string;
}

export interface IntervalChartProps {
  title: string;
  note?: ReactNode;
  rows: readonly IntervalRow[];
  /** Axis: "area, ha", "user's accuracy". */
  axisLabel: string;
  /** What the tick is, for the table and the note. */
  tickLabel?: string;
  decimals?: number;
  /** Full width of the axis; the largest value otherwise. */
  max?: number;
  fileName?: string;
}

const ROW_HEIGHT = 26;
const LABEL_WIDTH = 150;

/** One bar with its interval for each row, on one axis. */
export function IntervalChart({
  title,
  note,
  rows,
  axisLabel,
  tickLabel,
  decimals = 0,
  max: axisMax,
  fileName,
}: IntervalChartProps) {
  const [ref, width] = useWidth<HTMLDivElement>(520);
  const noteWidth = rows.some((row) => row.note) ? 64 : 10;
  const top = axisMax ?? max(rows, (row) => Math.max(row.value ?? 0, row.high ?? 0, row.tick ?? 0)) ?? 1;
  const x = scaleLinear([0, top || 1], [LABEL_WIDTH, Math.max(LABEL_WIDTH + 60, width - noteWidth)]);
  const height = rows.length * ROW_HEIGHT + 36;
  const foot = rows.length * ROW_HEIGHT + 4;
  return (
    <ChartFrame
      title={title}
      note={note}
      {...(fileName && { fileName })}
      data={{
        columns: [
          { name: 'Class' },
          { name: axisLabel, isNumber: true, decimals },
          { name: 'Low', isNumber: true, decimals },
          { name: 'High', isNumber: true, decimals },
          ...(tickLabel ? [{ name: tickLabel, isNumber: true, decimals }] : []),
        ],
        rows: rows.map((row) => [row.name, row.value, row.low, row.high, ...(tickLabel ? [row.tick] : [])]),
      }}
    >
      <div ref={ref}>
        <svg
          role="img"
          aria-label={`${title}: ${rows.length} bars with intervals. The table has the figures.`}
          viewBox={`0 0 ${width} ${height}`}
          width={width}
          height={height}
          className="block max-w-full"
          fontSize="12"
          fontFamily="'Work Sans', sans-serif"
        >
          {x.ticks(width > 500 ? 6 : 3).map((tick) => (
            <g key={tick}>
              <path d={`M${x(tick)} 0V${foot}`} stroke="var(--line)" />
              <text x={x(tick)} y={foot + 14} textAnchor="middle" fontSize="10.5" fill="var(--ink-soft)">
                {formatNumber(tick, decimals)}
              </text>
            </g>
          ))}
          <text x={LABEL_WIDTH} y={height - 3} fontSize="10.5" fill="var(--ink-soft)">
            {axisLabel}
          </text>
          {rows.map((row, index) => {
            const y = index * ROW_HEIGHT + ROW_HEIGHT / 2;
            return (
              <g key={row.id}>
                <text x={LABEL_WIDTH - 8} y={y + 4} textAnchor="end" fill="var(--ink)">
                  {row.name}
                </text>
                {row.value !== null && (
                  <rect
                    x={x(0)}
                    y={y - 5}
                    width={Math.max(0, x(row.value) - x(0))}
                    height="10"
                    rx="2"
                    fill={row.colour}
                    stroke="var(--swatch-edge)"
                    strokeWidth=".5"
                  />
                )}
                {row.low !== null && row.high !== null && (
                  <>
                    <path d={whisker(x(row.low), x(row.high), y)} stroke="var(--paper)" strokeWidth="3.600" />
                    <path d={whisker(x(row.low), x(row.high), y)} stroke="var(--ink)" strokeWidth="1.500" />
                  </>
                )}
                {row.tick !== null && row.tick !== undefined && (
                  <path d={`M${x(row.tick)} ${y - 9}v18`} stroke="var(--rust)" strokeWidth="1.600" />
                )}
                {row.note && (
                  <text x={width - 2} y={y + 4} textAnchor="end" fontSize="10.5" fill="var(--ink-soft)">
                    {row.note}
                  </text>
                )}
              </g>
            );
          })}
        </svg>
      </div>
    </ChartFrame>
  );
}

function whisker(from: number, to: number, y: number): string {
  return `M${from} ${y}H${to}M${from} ${y - 4.5}v9M${to} ${y - 4.5}v9`;
}
