import type { UseQueryResult } from '@tanstack/react-query';
import type { LandClass } from '../../../../shared/contracts/land-class.ts';
import type { DrawingJudgement } from '../../../../shared/contracts/signature.ts';
import { Facts } from '../../components/layout/slip.tsx';
import { Callout } from '../../components/ui/callout.tsx';
import { ErrorState } from '../../components/ui/error-state.tsx';
import { PendingState } from '../../components/ui/pending-state.tsx';
import { formatNumber, formatPercent } from '../../lib/format.ts';

export interface JudgementBlockProps {
  judgement: UseQueryResult<DrawingJudgement>;
  classes: readonly LandClass[];
}

/** How a sample stands to the others: what to beware of, then the figures behind it. */
export function JudgementBlock({ judgement, classes }: JudgementBlockProps) {
  if (judgement.isPending) return <PendingState label="Holding it against the other samples" />;
  if (judgement.isError) {
    return <ErrorState error={judgement.error} onRetry={() => void judgement.refetch()} isInline />;
  }
  const { warnings } = judgement.data;
  return (
    <div aria-busy={judgement.isPlaceholderData} className={judgement.isPlaceholderData ? 'opacity-60' : undefined}>
      {warnings.length > 0 && (
        <Callout tone="beware" className="mb-3">
          {warnings.length === 1 ? (
            warnings[0]
          ) : (
            <ul className="list-disc pl-4">
              {warnings.map((text) => (
                <li key={text}>{text}</li>
              ))}
            </ul>
          )}
        </Callout>
      )}
      <Facts facts={listFacts(judgement.data, classes)} />
      {judgement.data.noTypicality && <p className="mt-1.5 text-xs text-ink-soft">{judgement.data.noTypicality}</p>}
    </div>
  );
}

function listFacts({ typicality, mixing, rivals, heldOut }: DrawingJudgement, classes: readonly LandClass[]) {
  const nameOf = (id: string) => classes.find((one) => one.id === id)?.name ?? 'another class';
  const rival = rivals.find(({ isOwn }) => !isOwn);
  return [
    ...(typicality
      ? [
          { name: 'Distance from its class (Mahalanobis)', value: formatNumber(typicality.distance, 1) },
          {
            name: `Samples as far out, of ${typicality.nSamples}${typicality.isPooled ? ', spread of all classes' : ''}`,
            value: typicality.pValue < 0.001 ? 'under 0.1 %' : formatPercent(typicality.pValue, 1),
          },
        ]
      : []),
    ...(rival
      ? [
          {
            name: `Nearest other: ${nameOf(rival.classId)}`,
            value: rival.distance === null ? 'undefined' : formatNumber(rival.distance, 1),
          },
        ]
      : []),
    ...(mixing ? [{ name: 'Varies, against its class', value: `× ${formatNumber(mixing.ratio, 1)}` }] : []),
    ...(heldOut
      ? [
          heldOut.isItself
            ? { name: `Held out in run ${heldOut.runNumber}`, value: 'this sample' }
            : {
                name: `Held-out sample ${heldOut.sampleNumber} (run ${heldOut.runNumber})`,
                value: `${formatNumber(heldOut.distanceMeters)} m`,
              },
        ]
      : []),
  ];
}
