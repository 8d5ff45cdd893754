import type { Estimates } from '../../../../shared/contracts/reference.ts';
import { Marked, Statement } from '../../components/layout/reading-page.tsx';
import { HowComputed } from '../../components/figures/how-computed.tsx';
import { StateTag, type TagTone } from '../../components/ui/state-tag.tsx';
import { formatCount, formatNumber, formatPercent } from '../../lib/format.ts';
import { quotedInterval } from './figure-text.ts';

const VERDICTS: Record<'met' | 'missed' | 'uncertain', { tone: TagTone; text: string; why: string }> = {
  met: { tone: 'ok', text: 'Met', why: 'The whole interval reaches it.' },
  missed: { tone: 'danger', text: 'Missed', why: 'The whole interval is below it.' },
  uncertain: { tone: 'beware', text: 'Uncertain', why: 'The interval holds it; more reference points would tell.' },
};

/** What a client takes away: one sentence, and the target beside it. */
export function EstimateStatement({ estimates, above }: { estimates: Estimates; above: string }) {
  const { overall, design, target } = estimates;
  const interval = quotedInterval(overall);
  return (
    <Statement
      above={`${above} · ${formatCount(design.used, 'reference point')} in ${design.strata.length} strata`}
      below={
        <>
          From points drawn at random and interpreted without sight of the map, so it describes the map; these are the
          figures to quote.{' '}
          <span data-print="hide">
            <HowComputed name="Overall accuracy" how={overall.how} trigger="How was this computed?" />
          </span>
          {target && (
            <span className="mt-2 flex flex-wrap items-center gap-2.5 text-sm">
              Target: overall accuracy of at least {formatPercent(target.overall)}
              <StateTag tone={VERDICTS[target.verdict].tone}>{VERDICTS[target.verdict].text}</StateTag>
              <span>{VERDICTS[target.verdict].why}</span>
            </span>
          )}
        </>
      }
    >
      {overall.value === null ? (
        <>Overall accuracy is undefined. {estimates.problem}</>
      ) : (
        <>
          <Marked>{formatNumber(overall.value * 100, 1)} %</Marked> of the mapped area is mapped rightly
          {interval && (
            <>
              , give or take: between {formatNumber(interval.low * 100, 1)} and {formatNumber(interval.high * 100, 1)} %
              with 95 % confidence
            </>
          )}
          .
        </>
      )}
    </Statement>
  );
}
