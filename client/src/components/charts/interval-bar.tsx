import { formatNumber } from '../../lib/format.ts';

export interface IntervalBarProps {
  value: number | null;
  low: number | null;
  high: number | null;
  /** The value at the bar's full width, the same for all bars of a table. */
  max: number;
  colour: string;
  /** Another reading to compare: what counting map pixels would say. */
  tick?: number | null;
  /** Read out: "Arable, area in ha". */
  label: string;
  decimals?: number;
}

/** A value as a bar with its interval as whiskers, to stand in a table row beside its figures. */
export function IntervalBar({ value, low, high, max, colour, tick = null, label, decimals = 0 }: IntervalBarProps) {
  const at = (figure: number) => `${(100 * Math.min(1, Math.max(0, max > 0 ? figure / max : 0))).toFixed(2)}%`;
  const parts = [formatNumber(value, decimals)];
  if (low !== null && high !== null)
    parts.push(`from ${formatNumber(low, decimals)} to ${formatNumber(high, decimals)}`);
  if (tick !== null) parts.push(`tick at ${formatNumber(tick, decimals)}`);
  return (
    <svg
      role="img"
      aria-label={`${label}: ${parts.join(', ')}`}
      width="100%"
      height="18"
      className="block overflow-visible"
    >
      {value !== null && (
        <rect
          x="0"
          y="5"
          width={at(value)}
          height="8"
          rx="2"
          fill={colour}
          stroke="var(--swatch-edge)"
          strokeWidth=".5"
        />
      )}
      {low !== null && high !== null && (
        // A halo of the paper's colour keeps the whisker readable on a dark class colour.
        <g strokeWidth="1.500">
          {(['var(--paper)', 'var(--ink)'] as const).map((stroke, layer) => (
            <g key={stroke} stroke={stroke} strokeWidth={layer === 0 ? 3.5 : 1.5}>
              <line x1={at(low)} x2={at(high)} y1="9" y2="9" />
              <line x1={at(low)} x2={at(low)} y1="5" y2="13" />
              <line x1={at(high)} x2={at(high)} y1="5" y2="13" />
            </g>
          ))}
        </g>
      )}
      {tick !== null && <line x1={at(tick)} x2={at(tick)} y1="1" y2="17" stroke="var(--rust)" strokeWidth="1.500" />}
    </svg>
  );
}
