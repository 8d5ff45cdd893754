import type { ZoneEstimates } from '../../../../shared/contracts/zone.ts';
import { ChartFrame } from '../../components/charts/chart-frame.tsx';
import { HowComputed } from '../../components/figures/how-computed.tsx';
import { ErrorState } from '../../components/ui/error-state.tsx';
import { PendingState } from '../../components/ui/pending-state.tsx';
import { figureParts, quotedInterval } from './figure-text.ts';
import { useZoneEstimates } from './get-zone-estimates.ts';

export interface ZonePartProps {
  projectId: string;
  designId: string;
  layerId: string;
}

/** Accuracy and class shares zone by zone. */
export function ZonePart({ projectId, designId, layerId }: ZonePartProps) {
  const zones = useZoneEstimates(projectId, designId, layerId);
  if (zones.isPending) return <PendingState label="Sorting the points by zone" shape="table" rows={4} />;
  if (zones.isError) return <ErrorState error={zones.error} onRetry={() => void zones.refetch()} isInline />;
  return <ZoneTable estimates={zones.data} />;
}

function ZoneTable({ estimates }: { estimates: ZoneEstimates }) {
  const { zones, classes, layerName, cautions } = estimates;
  return (
    <>
      <ChartFrame
        title={layerName}
        isTable
        note="Overall accuracy, then the share of each zone that is of each class; in small print the 95 % intervals."
        data={{
          columns: [
            { name: 'Zone' },
            { name: 'Points', isNumber: true },
            ...['Overall accuracy', 'Low', 'High'].map((name) => ({ name, isNumber: true, decimals: 4 })),
            ...classes.flatMap(({ name }) =>
              [name, `${name} low`, `${name} high`].map((column) => ({ name: column, isNumber: true, decimals: 4 })),
            ),
          ],
          rows: zones.map(({ name, points, overall, classShares }) => [
            ...[name, points],
            ...[overall, ...classShares].flatMap((figure) => {
              const interval = quotedInterval(figure);
              return [figure.value, interval?.low ?? null, interval?.high ?? null];
            }),
          ]),
        }}
      >
        <div className="overflow-x-auto">
          <table
            className="w-full border-separate border-spacing-0 text-sm"
            aria-label={`Estimates by zone, ${layerName}`}
          >
            <thead>
              <tr className="text-ink-soft *:pb-1 *:pl-3 *:text-right *:align-bottom *:font-medium">
                <th scope="col" className="pl-0! text-left!">
                  Zone
                </th>
                <th scope="col">Points</th>
                <th scope="col">Overall accuracy</th>
                {classes.map(({ id, name }) => (
                  <th key={id} scope="col" className="max-w-28">
                    {name}
                  </th>
                ))}
              </tr>
            </thead>
            <tbody>
              {zones.map((zone) => (
                <tr
                  key={zone.name}
                  className="*:border-t *:border-line *:py-1.5 *:pl-3 *:text-right *:whitespace-nowrap"
                >
                  <th scope="row" className="pl-0! text-left! font-normal">
                    {zone.name}
                  </th>
                  <td>{zone.points}</td>
                  {[zone.overall, ...zone.classShares].map((figure, place) => {
                    const { value, interval } = figureParts(figure, true);
                    const name = place === 0 ? 'Overall accuracy' : `Share of ${classes[place - 1]?.name}`;
                    return (
                      <td key={place}>
                        <HowComputed name={`${name} in ${zone.name}`} how={figure.how} trigger={value} />
                        {interval && <span className="block text-xs text-ink-soft">{interval}</span>}
                      </td>
                    );
                  })}
                </tr>
              ))}
            </tbody>
          </table>
        </div>
      </ChartFrame>
      {cautions.map((text) => (
        <p key={text} className="mt-2 text-sm text-ink-soft">
          {text}
        </p>
      ))}
    </>
  );
}
