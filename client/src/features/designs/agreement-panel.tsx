import type { Agreement, Design } from '../../../../shared/contracts/reference.ts';
import { ChartFrame } from '../../components/charts/chart-frame.tsx';
import { HowComputed } from '../../components/figures/how-computed.tsx';
import { Callout } from '../../components/ui/callout.tsx';
import { ErrorState } from '../../components/ui/error-state.tsx';
import { PendingState } from '../../components/ui/pending-state.tsx';
import { formatCount, formatNumber } from '../../lib/format.ts';
import { useAgreement } from './get-agreement.ts';

type Figure = Agreement['raw'];

/** How far the people who interpreted a design agree. */
export function AgreementPanel({ design }: { design: Design }) {
  const agreement = useAgreement(design.projectId, design.id, true);
  if (agreement.isPending) return <PendingState label="Comparing the answers" rows={4} />;
  if (agreement.isError)
    return <ErrorState error={agreement.error} onRetry={() => void agreement.refetch()} isInline />;
  const rows = listRows(agreement.data);
  if (agreement.data.nPoints === 0) {
    return <Callout>No point has two answers, so nothing can be said about agreement.</Callout>;
  }
  return (
    <>
      <ChartFrame
        title="Agreement"
        isTitleHidden
        isTable
        note={`${formatCount(agreement.data.nPoints, 'point')} with two answers or more; whiskers are 95 % intervals over points.`}
        data={{
          columns: [
            { name: 'Figure' },
            { name: 'Value', isNumber: true, decimals: 4 },
            { name: 'Standard error', isNumber: true, decimals: 4 },
            { name: 'Low', isNumber: true, decimals: 4 },
            { name: 'High', isNumber: true, decimals: 4 },
            { name: 'Points', isNumber: true },
          ],
          rows: rows.map(({ name, figure }) => [
            name,
            figure.value,
            figure.standardError,
            figure.low,
            figure.high,
            figure.n,
          ]),
        }}
      >
        <table className="w-full border-separate border-spacing-0 text-sm" aria-label="Agreement">
          <thead>
            <tr className="text-ink-soft *:pb-1 *:pl-3 *:text-right *:font-medium">
              <th scope="col" className="pl-0! text-left!">
                Figure
              </th>
              <th scope="col">Value</th>
              <th scope="col">95 % interval</th>
              <th scope="col">Points</th>
            </tr>
          </thead>
          <tbody>
            {rows.map(({ name, figure }) => (
              <tr key={name} className="*:border-t *:border-line *:py-1.5 *:pl-3 *:text-right">
                <th scope="row" className="pl-0! text-left! font-normal">
                  <HowComputed name={name} how={figure.how} trigger={name} />
                </th>
                <td className="font-medium">{figure.value === null ? 'undefined' : formatNumber(figure.value, 3)}</td>
                <td>
                  {figure.low === null || figure.high === null
                    ? 'undefined'
                    : `${formatNumber(figure.low, 3)} to ${formatNumber(figure.high, 3)}`}
                </td>
                <td>{formatNumber(figure.n)}</td>
              </tr>
            ))}
          </tbody>
        </table>
      </ChartFrame>
      {agreement.data.cautions.map((caution) => (
        <p key={caution} className="mt-2 text-sm text-ink-soft">
          {caution}
        </p>
      ))}
    </>
  );
}

function listRows({ raw, cohen, fleiss, krippendorff, interpreters }: Agreement): { name: string; figure: Figure }[] {
  const nameOf = (place: number) => interpreters[place]?.person?.name ?? 'someone no longer here';
  return [
    { name: 'Same class (raw agreement)', figure: raw },
    ...cohen.map(({ first, second, figure }) => ({
      name: `Cohen’s kappa, ${nameOf(first)} and ${nameOf(second)}`,
      figure,
    })),
    { name: 'Fleiss’ kappa', figure: fleiss },
    { name: 'Krippendorff’s alpha', figure: krippendorff },
  ];
}
