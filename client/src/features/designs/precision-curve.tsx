import { max } from 'd3-array';
import { scaleLinear } from 'd3-scale';
import { line } from 'd3-shape';
import type { DesignPlan } from '../../../../shared/contracts/reference.ts';
import { ChartFrame } from '../../components/charts/chart-frame.tsx';
import { formatNumber } from '../../lib/format.ts';
import { useWidth } from '../../lib/use-width.ts';

const HEIGHT = 190;
const MARGIN = { top: 10, right: 12, bottom: 34, left: 46 };

/** Half-width of overall accuracy's 95 % interval against the number of points, with the plan's own place on it. */
export function PrecisionCurve({ plan }: { plan: DesignPlan }) {
  const [ref, width] = useWidth<HTMLDivElement>(360);
  const known = plan.curve.flatMap(({ n, halfWidth }) => (halfWidth === null ? [] : [{ n, halfWidth }]));
  const x = scaleLinear([0, max(known, ({ n }) => n) ?? 1], [MARGIN.left, width - MARGIN.right]);
  const top = max(known, ({ halfWidth }) => halfWidth) ?? 0.1;
  const y = scaleLinear([0, top], [HEIGHT - MARGIN.bottom, MARGIN.top]).nice(4);
  const path = line<(typeof known)[number]>(
    ({ n }) => x(n),
    ({ halfWidth }) => y(halfWidth),
  )(known);
  return (
    <ChartFrame
      title="Precision by number of points"
      note="Half-width of the 95 % interval of overall accuracy."
      data={{
        columns: [
          { name: 'Points', isNumber: true },
          { name: 'Standard error', isNumber: true, decimals: 5 },
          { name: 'Half-width', isNumber: true, decimals: 5 },
        ],
        rows: plan.curve.map(({ n, standardError, halfWidth }) => [n, standardError, halfWidth]),
      }}
    >
      <div ref={ref}>
        <svg
          role="img"
          aria-label={`Half-width against points; ${plan.n} points give ${formatNumber((plan.halfWidth ?? Number.NaN) * 100, 1)} per cent. The table has the figures.`}
          viewBox={`0 0 ${width} ${HEIGHT}`}
          width={width}
          height={HEIGHT}
          className="block max-w-full"
          fontSize="10.5"
          fontFamily="'Work Sans', sans-serif"
        >
          {y.ticks(4).map((tick) => (
            <g key={tick}>
              <path d={`M${MARGIN.left} ${y(tick)}H${width - MARGIN.right}`} stroke="var(--line)" />
              <text x={MARGIN.left - 6} y={y(tick) + 3.5} textAnchor="end" fill="var(--ink-soft)">
                ±{formatNumber(tick * 100, 1)} %
              </text>
            </g>
          ))}
          {x.ticks(width > 380 ? 6 : 4).map((tick) => (
            <text key={tick} x={x(tick)} y={HEIGHT - MARGIN.bottom + 15} textAnchor="middle" fill="var(--ink-soft)">
              {formatNumber(tick)}
            </text>
          ))}
          <text x={width - MARGIN.right} y={HEIGHT - 4} textAnchor="end" fill="var(--ink-soft)">
            points
          </text>
          {path && <path d={path} fill="none" stroke="var(--ink)" strokeWidth="1.8" />}
          {plan.halfWidth !== null && (
            <g>
              <path
                d={`M${x(plan.n)} ${y(plan.halfWidth)}V${HEIGHT - MARGIN.bottom}M${MARGIN.left} ${y(plan.halfWidth)}H${x(plan.n)}`}
                stroke="var(--groundsel-deep)"
                strokeDasharray="4 3"
              />
              <circle
                cx={x(plan.n)}
                cy={y(plan.halfWidth)}
                r="5.5"
                fill="var(--groundsel)"
                stroke="var(--ink)"
                strokeWidth="1.6"
              />
            </g>
          )}
        </svg>
      </div>
    </ChartFrame>
  );
}
