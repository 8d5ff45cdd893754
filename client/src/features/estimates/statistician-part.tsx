import type { DesignFigure, Estimates } from '../../../../shared/contracts/reference.ts';
import { ChartFrame } from '../../components/charts/chart-frame.tsx';
import { HowComputed } from '../../components/figures/how-computed.tsx';
import { formatHectares, formatMeters, formatNumber, formatPercent } from '../../lib/format.ts';
import { figurePhrase } from './figure-text.ts';

/** All a statistician asks for: design, weights, estimators, and the matrix as shares of the area. */
export function StatisticianPart({ estimates }: { estimates: Estimates }) {
  return (
    <div className="space-y-8">
      <Figures estimates={estimates} />
      <Strata estimates={estimates} />
      <Proportions estimates={estimates} />
    </div>
  );
}

function Figures({ estimates }: { estimates: Estimates }) {
  const { overall, eitherLabel, quantityDisagreement, allocationDisagreement, kappa, design } = estimates;
  const rows: [string, DesignFigure][] = [
    ['Overall accuracy', overall],
    ['Overall accuracy, either label right', eitherLabel.overall],
    ['Quantity disagreement', quantityDisagreement],
    ['Allocation disagreement', allocationDisagreement],
    ['Kappa', kappa],
  ];
  return (
    <ChartFrame
      title="Figures of the map"
      isTable
      note={`${design.used} of ${design.n} points used, ${design.unsettled} without a class, ${design.decided} decided by the reviewer; seed ${design.seed}; least distance ${design.minSpacingMeters > 0 ? formatMeters(design.minSpacingMeters) : 'none'}; mapped area ${formatHectares(design.totalAreaHa)}.`}
      data={{
        columns: [
          { name: 'Figure' },
          { name: 'Value', isNumber: true, decimals: 5 },
          { name: 'Standard error', isNumber: true, decimals: 5 },
          { name: 'Low', isNumber: true, decimals: 5 },
          { name: 'High', isNumber: true, decimals: 5 },
          { name: 'Points', isNumber: true },
        ],
        rows: rows.map(([name, one]) => [name, one.value, one.standardError, one.low, one.high, one.n]),
      }}
    >
      <div className="overflow-x-auto">
        <table className="w-full border-separate border-spacing-0 text-sm" aria-label="Figures of the map">
          <thead>
            <tr className="text-ink-soft *:pb-1 *:pl-3 *:text-right *:font-medium">
              <th scope="col" className="pl-0! text-left!">
                Figure
              </th>
              <th scope="col">Estimate (95 % interval)</th>
              <th scope="col">Standard error</th>
              <th scope="col">Points</th>
            </tr>
          </thead>
          <tbody>
            {rows.map(([name, one]) => (
              <tr key={name} className="*:border-t *:border-line *:py-1.5 *:pl-3 *:text-right">
                <th scope="row" className="pl-0! text-left! font-normal">
                  <HowComputed name={name} how={one.how} trigger={name} />
                </th>
                <td className="whitespace-nowrap">{figurePhrase(one)}</td>
                <td>{standardErrorText(one)}</td>
                <td>{formatNumber(one.n)}</td>
              </tr>
            ))}
          </tbody>
        </table>
      </div>
      <p className="mt-2 max-w-[62rem] text-sm text-ink-soft">{kappa.caution}</p>
    </ChartFrame>
  );
}

/** A standard error that cannot be computed is undefined, never 0. */
function standardErrorText({ standardError }: DesignFigure): string {
  return standardError === null ? 'undefined' : formatNumber(standardError, 4);
}

function Strata({ estimates: { design } }: { estimates: Estimates }) {
  return (
    <ChartFrame
      title="Strata and weights"
      isTable
      data={{
        columns: [
          { name: 'Stratum' },
          { name: 'Pixels', isNumber: true },
          { name: 'Area, ha', isNumber: true, decimals: 3 },
          { name: 'Weight', isNumber: true, decimals: 8 },
          { name: 'Points drawn', isNumber: true },
          { name: 'Points used', isNumber: true },
        ],
        rows: design.strata.map((one) => [one.name, one.pixels, one.areaHa, one.weight, one.drawn, one.used]),
      }}
    >
      <div className="overflow-x-auto">
        <table className="w-full border-separate border-spacing-0 text-sm" aria-label="Strata and weights">
          <thead>
            <tr className="text-ink-soft *:pb-1 *:pl-3 *:text-right *:font-medium">
              <th scope="col" className="pl-0! text-left!">
                Stratum
              </th>
              <th scope="col">Pixels N</th>
              <th scope="col">Area</th>
              <th scope="col">Weight W</th>
              <th scope="col">Drawn</th>
              <th scope="col">Used n</th>
            </tr>
          </thead>
          <tbody>
            {design.strata.map((one) => (
              <tr key={one.code} className="*:border-t *:border-line *:py-1 *:pl-3 *:text-right">
                <th scope="row" className="pl-0! text-left! font-normal">
                  {one.name}
                </th>
                <td>{formatNumber(one.pixels)}</td>
                <td className="whitespace-nowrap">{formatHectares(one.areaHa)}</td>
                <td>{formatNumber(one.weight, 5)}</td>
                <td>{one.drawn}</td>
                <td>{one.used}</td>
              </tr>
            ))}
          </tbody>
        </table>
      </div>
    </ChartFrame>
  );
}

function Proportions({ estimates }: { estimates: Estimates }) {
  const { proportions, rows, columns, problem } = estimates;
  if (!proportions) return problem ? <p className="text-sm text-ink-soft">{problem}</p> : null;
  return (
    <ChartFrame
      title="Matrix as estimated shares of the area"
      isTable
      note="Rows: mapped class. Columns: reference class. Per cent of the mapped area (Olofsson et al. 2014, Eq. 4)."
      data={{
        columns: [
          { name: 'mapped \\ reference' },
          ...columns.map(({ name }) => ({ name, isNumber: true, decimals: 6 })),
        ],
        rows: proportions.map((row, i) => [rows[i]?.name, ...row]),
      }}
    >
      <div className="overflow-x-auto">
        <table className="border-separate border-spacing-0 text-xs" aria-label="Estimated shares of the area">
          <thead>
            <tr className="text-ink-soft *:pb-1 *:pl-2.5 *:text-right *:align-bottom *:font-medium">
              <td />
              {columns.map(({ id, name }) => (
                <th key={id} scope="col">
                  <span className="inline-block max-h-32 rotate-180 text-left [writing-mode:vertical-rl]">{name}</span>
                </th>
              ))}
            </tr>
          </thead>
          <tbody>
            {proportions.map((row, i) => (
              <tr key={rows[i]?.code} className="*:border-t *:border-line *:py-1 *:pl-2.5 *:text-right">
                <th scope="row" className="pl-0! text-left! font-normal">
                  {rows[i]?.name}
                </th>
                {row.map((share, j) => (
                  <td key={columns[j]?.id} className={share === 0 ? 'text-ink-soft' : undefined}>
                    {share === 0 ? '0' : formatPercent(share, 2)}
                  </td>
                ))}
              </tr>
            ))}
          </tbody>
        </table>
      </div>
    </ChartFrame>
  );
}
