import { max } from 'd3-array';
import { scaleLinear } from 'd3-scale';
import type { SignatureSet } from '../../../../shared/contracts/signature.ts';
import { ChartFrame } from '../../components/charts/chart-frame.tsx';
import { lineColour } from '../../components/charts/spectral-series.ts';
import { formatNumber } from '../../lib/format.ts';
import { useWidth } from '../../lib/use-width.ts';

export interface ClassHistogramsProps {
  set: SignatureSet;
  /** Place in `set.features`. */
  feature: number;
  shown: ReadonlySet<number>;
}

const ROW = 40;
const LEFT = 148;
const FOOT = 26;

/** How each class's pixels are spread over one band or index, one row a class on the same axis. */
export function ClassHistograms({ set, feature: f, shown }: ClassHistogramsProps) {
  const [ref, width] = useWidth<HTMLDivElement>(560);
  const feature = set.features[f];
  const histogram = set.histograms[f];
  if (!feature || !histogram) return null;
  const { from, to, counts } = histogram;
  const rows = set.classes.flatMap((one, c) => (shown.has(c) ? [{ one, counts: counts[c] ?? [] }] : []));
  const nBins = counts[0]?.length ?? 1;
  const x = scaleLinear([from, to], [LEFT, width - 8]);
  const height = rows.length * ROW + FOOT;
  const edge = (bin: number) => from + ((to - from) * bin) / nBins;
  const decimals = feature.quantity === 'reflectance' || feature.kind === 'index' ? 2 : 0;
  return (
    <ChartFrame
      title={`${feature.name} by class`}
      isTitleHidden
      note="Each row to its own height."
      data={{
        columns: [
          { name: 'Class' },
          { name: 'From', isNumber: true, decimals: 4 },
          { name: 'To', isNumber: true, decimals: 4 },
          { name: 'Pixels', isNumber: true },
        ],
        rows: rows.flatMap(({ one, counts: row }) =>
          row.map((count, bin) => [one.name, edge(bin), edge(bin + 1), count]),
        ),
      }}
    >
      <div ref={ref}>
        <svg
          role="img"
          aria-label={`Histograms of ${feature.name}, one a class. The table has the figures.`}
          viewBox={`0 0 ${width} ${height}`}
          width={width}
          height={height}
          className="block max-w-full"
          fontSize="11"
          fontFamily="'Work Sans', sans-serif"
        >
          {x.ticks(width > 500 ? 7 : 4).map((tick) => (
            <g key={tick}>
              <path d={`M${x(tick)} 0V${height - FOOT}`} stroke="var(--line)" />
              <text x={x(tick)} y={height - 8} textAnchor="middle" fill="var(--ink-soft)">
                {formatNumber(tick, decimals)}
              </text>
            </g>
          ))}
          {rows.map(({ one, counts: row }, place) => {
            const base = (place + 1) * ROW - 2;
            const tallest = max(row) || 1;
            const outline = row
              .map(
                (count, bin) => `V${(base - (count / tallest) * (ROW - 8)).toFixed(1)}H${x(edge(bin + 1)).toFixed(1)}`,
              )
              .join('');
            return (
              <g key={one.classId}>
                <path
                  d={`M${x(from)} ${base}${outline}V${base}Z`}
                  fill={one.colour}
                  fillOpacity=".7"
                  stroke={lineColour(one)}
                />
                <path d={`M${LEFT} ${base}H${width - 8}`} stroke="var(--edge)" />
                <text x={LEFT - 8} y={base - 8} textAnchor="end" fill="var(--ink)">
                  {one.name.length > 22 ? `${one.name.slice(0, 21)}…` : one.name}
                </text>
              </g>
            );
          })}
        </svg>
      </div>
    </ChartFrame>
  );
}
