import { max, sum } from 'd3-array';
import { scaleLinear } from 'd3-scale';
import type { ReactNode } from 'react';
import { formatNumber, formatPercent } from '../../lib/format.ts';
import { useWidth } from '../../lib/use-width.ts';
import { Slider } from '../ui/slider.tsx';
import { ChartFrame } from './chart-frame.tsx';

export interface HistogramProps {
  title: string;
  note?: ReactNode;
  /** Pixels in each of the equal bins between `low` and `high`. */
  counts: readonly number[];
  /** Lower edge of the first bin and upper edge of the last. */
  low: number;
  high: number;
  /** What the axis counts: "reflectance", "DN". */
  axisLabel: string;
  decimals?: number;
  colour?: string;
  /** Values drawn darkest and brightest; gives the handles. */
  stretch?: { low: number; high: number };
  onStretchChange?: (stretch: { low: number; high: number }) => void;
  /** Once, on letting go. */
  onStretchCommit?: (stretch: { low: number; high: number }) => void;
  plotHeight?: number;
  isTitleHidden?: boolean;
}

/** Half the slider's thumb: puts its middle on the plot's edges at either end. */
const SIDE = 8;

/** How a band's values are spread, with handles for the stretch. */
export function Histogram({
  title,
  note,
  counts,
  low,
  high,
  axisLabel,
  decimals = 2,
  colour = 'var(--ink-soft)',
  stretch,
  onStretchChange,
  onStretchCommit,
  plotHeight = 84,
  isTitleHidden = false,
}: HistogramProps) {
  const [ref, width] = useWidth<HTMLDivElement>(300);
  const binSize = (high - low) / Math.max(1, counts.length);
  const x = scaleLinear([low, high], [SIDE, width - SIDE]);
  const y = scaleLinear([0, max(counts) || 1], [plotHeight, 4]);
  const total = sum(counts);
  const outline = counts
    .map((count, bin) => `V${y(count).toFixed(2)}H${x(low + (bin + 1) * binSize).toFixed(2)}`)
    .join('');
  const clipped = stretch ? clippedShare(counts, low, binSize, stretch) : null;
  const asStretch = ([first = low, second = high]: number[]) => ({ low: first, high: second });
  return (
    <ChartFrame
      title={title}
      note={note}
      isTitleHidden={isTitleHidden}
      data={{
        columns: [
          { name: 'From', isNumber: true, decimals: decimals + 2 },
          { name: 'To', isNumber: true, decimals: decimals + 2 },
          { name: 'Pixels', isNumber: true },
        ],
        rows: counts.map((count, bin) => [low + bin * binSize, low + (bin + 1) * binSize, count]),
      }}
    >
      <div ref={ref}>
        <svg
          role="img"
          aria-label={`Histogram of ${title}: ${formatNumber(total)} pixels between ${formatNumber(low, decimals)} and ${formatNumber(high, decimals)}. The table has the figures.`}
          viewBox={`0 0 ${width} ${plotHeight + 18}`}
          width={width}
          height={plotHeight + 18}
          className="block max-w-full"
          fontSize="10.5"
          fontFamily="'Work Sans', sans-serif"
        >
          <path
            d={`M${x(low)} ${plotHeight}${outline}V${plotHeight}Z`}
            fill={colour}
            fillOpacity=".55"
            stroke={colour}
            strokeWidth=".8"
          />
          {stretch && (
            <g>
              <rect
                x={SIDE}
                y="0"
                width={Math.max(0, x(stretch.low) - SIDE)}
                height={plotHeight}
                fill="var(--card)"
                opacity=".7"
              />
              <rect
                x={x(stretch.high)}
                y="0"
                width={Math.max(0, width - SIDE - x(stretch.high))}
                height={plotHeight}
                fill="var(--card)"
                opacity=".7"
              />
              <path d={`M${x(stretch.low)} ${plotHeight}L${x(stretch.high)} 4`} stroke="var(--ink)" strokeWidth="1.4" />
              <path
                d={`M${x(stretch.low)} 0V${plotHeight}M${x(stretch.high)} 0V${plotHeight}`}
                stroke="var(--groundsel-deep)"
                strokeWidth="2"
              />
            </g>
          )}
          <path d={`M${SIDE} ${plotHeight}H${width - SIDE}`} stroke="var(--edge)" />
          {x.ticks(width > 380 ? 6 : 4).map((tick) => (
            <text
              key={tick}
              x={x(tick)}
              y={plotHeight + 13}
              textAnchor={anchorAt(x(tick), width)}
              fill="var(--ink-soft)"
            >
              {formatNumber(tick, decimals)}
            </text>
          ))}
        </svg>
        {stretch && (
          <Slider
            value={[stretch.low, stretch.high]}
            onChange={(value) => onStretchChange?.(asStretch(value))}
            onCommit={(value) => onStretchCommit?.(asStretch(value))}
            min={low}
            max={high}
            step={(high - low) / 500}
            labels={[`${title}: drawn darkest`, `${title}: drawn brightest`]}
            formatValue={(value) => formatNumber(value, decimals + 1)}
          />
        )}
        <p className="text-xs text-ink-soft">
          {axisLabel}
          {stretch &&
            clipped &&
            ` · drawn from ${formatNumber(stretch.low, decimals + 1)} to ${formatNumber(stretch.high, decimals + 1)} · clipped ${formatPercent(clipped.below, 1)} below, ${formatPercent(clipped.above, 1)} above`}
        </p>
      </div>
    </ChartFrame>
  );
}

/** The first and the last label must not run out of the drawing. */
function anchorAt(place: number, width: number): 'start' | 'middle' | 'end' {
  if (place < 16) return 'start';
  return place > width - 16 ? 'end' : 'middle';
}

/** Shares of pixels outside the stretch, to the accuracy of a bin cut in proportion. */
export function clippedShare(
  counts: readonly number[],
  low: number,
  binSize: number,
  stretch: { low: number; high: number },
): { below: number; above: number } {
  const total = sum(counts) || 1;
  let below = 0;
  let above = 0;
  counts.forEach((count, bin) => {
    const from = low + bin * binSize;
    below += count * Math.min(1, Math.max(0, (stretch.low - from) / binSize));
    above += count * Math.min(1, Math.max(0, (from + binSize - stretch.high) / binSize));
  });
  return { below: below / total, above: above / total };
}
