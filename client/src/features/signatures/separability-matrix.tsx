import type { SignatureSet } from '../../../../shared/contracts/signature.ts';
import { ChartFrame } from '../../components/charts/chart-frame.tsx';
import { ClassSwatch } from '../../components/ui/class-swatch.tsx';
import { formatNumber, formatPercent } from '../../lib/format.ts';
import { PAIR_FIGURES, type PairFigure, pairOf, riskOf } from './pair-figures.ts';

export interface SeparabilityMatrixProps {
  set: SignatureSet;
  figure: PairFigure;
}

/** How far apart each two classes lie; the darker a cell, the more their pixels may be taken for each other. */
export function SeparabilityMatrix({ set, figure }: SeparabilityMatrixProps) {
  const { classes, pairs } = set;
  const { name, decimals, note } = PAIR_FIGURES[figure];
  return (
    <ChartFrame
      title={name}
      isTitleHidden
      isTable
      note={`${note} Shading: how many pixels may be taken for the other class at most.`}
      data={{
        columns: [
          { name: 'Class' },
          { name: 'Other class' },
          { name: 'Bhattacharyya distance', isNumber: true, decimals: 4 },
          { name: 'Jeffries–Matusita, 0 to 1.414', isNumber: true, decimals: 4 },
          { name: 'Jeffries–Matusita squared, 0 to 2', isNumber: true, decimals: 4 },
          { name: 'Transformed divergence, 0 to 2', isNumber: true, decimals: 4 },
          { name: 'Error bound', isNumber: true, decimals: 4 },
          { name: 'Why none' },
        ],
        rows: pairs.map((pair) => [
          classes[pair.first]?.name,
          classes[pair.second]?.name,
          pair.bhattacharyya,
          pair.jeffriesMatusita,
          pair.jeffriesMatusitaSquared,
          pair.transformedDivergence,
          pair.errorBound,
          pair.reason,
        ]),
      }}
    >
      <div className="overflow-x-auto pb-1">
        <table className="border-separate border-spacing-0.5 text-sm" aria-label={`${name} of each two classes`}>
          <thead>
            <tr>
              <td />
              {classes.slice(0, -1).map((one) => (
                <th
                  key={one.classId}
                  scope="col"
                  className="px-0.5 pb-1.5 text-center align-bottom text-2xs leading-tight font-medium text-ink-soft"
                >
                  <span className="inline-block max-h-36 rotate-180 truncate text-left [writing-mode:vertical-rl]">
                    {one.name}
                  </span>
                </th>
              ))}
            </tr>
          </thead>
          <tbody>
            {classes.slice(1).map((row, below) => (
              <tr key={row.classId}>
                <th scope="row" className="max-w-48 py-1 pr-2 text-left font-medium text-ink-soft">
                  <span className="flex items-center gap-2 leading-tight">
                    <ClassSwatch size="sm" colour={row.colour} position={row.position} />
                    {row.name}
                  </span>
                </th>
                {classes.slice(0, below + 1).map((column, c) => {
                  const pair = pairOf(pairs, below + 1, c);
                  const value = pair?.[figure] ?? null;
                  return (
                    <td
                      key={column.classId}
                      title={describe(row.name, column.name, pair)}
                      className="h-[30px] min-w-11 rounded-sm px-1 text-center"
                      style={pair && value !== null ? shade(riskOf(pair)) : { background: 'var(--sunken)' }}
                    >
                      {value === null ? '–' : formatNumber(value, decimals)}
                      <span className="sr-only">, {column.name}</span>
                    </td>
                  );
                })}
              </tr>
            ))}
          </tbody>
        </table>
      </div>
    </ChartFrame>
  );
}

/** Paper for pairs well apart, rust for those that can hardly be told; the ink stays readable on both. */
function shade(risk: number) {
  const strength = Math.round(Math.sqrt(risk) * 62);
  return {
    background: `color-mix(in srgb, var(--rust) ${strength}%, var(--card))`,
    color: strength > 45 ? 'var(--paper)' : 'var(--ink)',
    fontWeight: strength > 20 ? 600 : 400,
  };
}

function describe(one: string, two: string, pair: SignatureSet['pairs'][number] | undefined): string {
  if (!pair || pair.errorBound === null) return `${one} and ${two}: ${pair?.reason ?? 'no figure'}`;
  return `${one} and ${two}: at most ${formatPercent(pair.errorBound, 1)} taken for each other`;
}
