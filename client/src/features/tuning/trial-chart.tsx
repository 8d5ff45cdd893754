import { extent } from 'd3-array';
import { scaleLinear } from 'd3-scale';
import type { Tuning, TuningTrial } from '../../../../shared/contracts/tuning.ts';
import { ChartFrame } from '../../components/charts/chart-frame.tsx';
import { formatPercent } from '../../lib/format.ts';
import { useWidth } from '../../lib/use-width.ts';
import { printValue, settingLabel } from './tuning-settings.ts';

const ROW_HEIGHT = 24;
const NAME_WIDTH = 256;
const FIGURE_WIDTH = 58;
const FOOT = 38;

/** Each trial's accuracy in every fold and on average, the best on top. */
export function TrialChart({ tuning }: { tuning: Tuning }) {
  const [ref, width] = useWidth<HTMLDivElement>(640);
  const judged = tuning.trials
    .filter((trial) => trial.meanAccuracy !== null)
    .toSorted((a, b) => (b.meanAccuracy ?? 0) - (a.meanAccuracy ?? 0) || a.number - b.number);
  if (judged.length === 0) return null;
  const [low = 0, high = 1] = extent(judged.flatMap((trial) => trial.foldAccuracies.filter((value) => value !== null)));
  const x = scaleLinear([low, high], [NAME_WIDTH, width - FIGURE_WIDTH]).nice(5);
  const bottom = judged.length * ROW_HEIGHT;
  return (
    <ChartFrame
      title="Accuracy of each trial"
      note="A ring is a fold, the bar their mean with a standard deviation to each side. The folds share training samples, so the spread is no confidence interval."
      fileName="tuning"
      data={{
        columns: [
          { name: 'Trial', isNumber: true },
          { name: 'Settings' },
          { name: 'Mean', isNumber: true, decimals: 4 },
          { name: 'Spread', isNumber: true, decimals: 4 },
          ...Array.from({ length: tuning.plan.folds }, (_, fold) => ({
            ...{ name: `Fold ${fold + 1}`, isNumber: true, decimals: 4 },
          })),
        ],
        rows: judged.map((trial) => [
          ...[trial.number, describeTrial(tuning, trial), trial.meanAccuracy, trial.spread],
          ...trial.foldAccuracies,
        ]),
      }}
    >
      <div ref={ref}>
        <svg
          role="img"
          aria-label={`Accuracy of ${judged.length} trials, fold by fold. The table has the figures.`}
          viewBox={`0 0 ${width} ${bottom + FOOT}`}
          width={width}
          height={bottom + FOOT}
          className="block max-w-full"
          fontSize="12"
          fontFamily="'Work Sans', sans-serif"
        >
          {x.ticks(5).map((tick) => (
            <g key={tick}>
              <path d={`M${x(tick)} 0V${bottom + 3}`} stroke="var(--line)" />
              <text x={x(tick)} y={bottom + 17} textAnchor="middle" fontSize="10.5" fill="var(--ink-soft)">
                {formatPercent(tick, 1)}
              </text>
            </g>
          ))}
          <text x={NAME_WIDTH} y={bottom + 33} fontSize="10.5" fill="var(--ink-soft)">
            share of a fold’s pixels given their class
          </text>
          {judged.map((trial, index) => (
            <TrialRow
              key={trial.number}
              trial={trial}
              name={describeTrial(tuning, trial)}
              isBest={trial.number === tuning.bestTrial}
              y={index * ROW_HEIGHT + ROW_HEIGHT / 2}
              x={x}
              width={width}
            />
          ))}
        </svg>
      </div>
    </ChartFrame>
  );
}

interface TrialRowProps {
  trial: TuningTrial;
  name: string;
  isBest: boolean;
  y: number;
  x: (value: number) => number;
  width: number;
}

function TrialRow({ trial, name, isBest, y, x, width }: TrialRowProps) {
  const mean = trial.meanAccuracy ?? 0;
  const spread = trial.spread ?? 0;
  const shown = name.length > 42 ? `${name.slice(0, 41)}…` : name;
  return (
    <g>
      <title>{`Trial ${trial.number}: ${name}`}</title>
      <text x={NAME_WIDTH - 10} y={y + 4} textAnchor="end" fill="var(--ink)" fontWeight={isBest ? 600 : 400}>
        {shown}
      </text>
      <path d={`M${x(mean - spread)} ${y}H${x(mean + spread)}`} stroke="var(--ink-soft)" strokeWidth="1.5" />
      {trial.foldAccuracies.map(
        (value, fold) =>
          value !== null && (
            <circle
              key={fold}
              cx={x(value)}
              cy={y}
              r="3.5"
              fill="var(--card)"
              stroke="var(--spruce)"
              strokeWidth="1.4"
            />
          ),
      )}
      <path d={`M${x(mean)} ${y - 8}v16`} stroke="var(--ink)" strokeWidth="2.5" />
      <text x={width - 2} y={y + 4} textAnchor="end" fill="var(--ink)" fontWeight={isBest ? 600 : 400}>
        {formatPercent(mean, 1)}
      </text>
    </g>
  );
}

function describeTrial(tuning: Tuning, trial: TuningTrial): string {
  const { kind } = tuning.recipe.classifier;
  return tuning.plan.ranges
    .map(
      ({ parameter }, index) =>
        `${settingLabel(kind, parameter).toLowerCase()} ${printValue(trial.values[index] ?? null)}`,
    )
    .join(', ');
}
