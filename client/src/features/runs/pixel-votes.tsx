import type { Run, RunVotes } from '../../../../shared/contracts/run.ts';
import { ClassSwatch } from '../../components/ui/class-swatch.tsx';
import { withPositions } from '../../lib/class-positions.ts';
import { formatPercent } from '../../lib/format.ts';

interface PixelVotesProps {
  run: Pick<Run, 'classes'>;
  votes: RunVotes;
  scheme: readonly { id: string; position: number }[];
}

/** Every class with its share of the votes on one pixel, the winner first, and how clear it was. */
export function PixelVotes({ run, votes, scheme }: PixelVotesProps) {
  const classes = new Map(withPositions(run.classes, scheme).map((one) => [one.id, one]));
  const given = votes.shares.filter(({ share }) => share >= 0.0005);
  const nNone = votes.shares.length - given.length;
  const noun = votes.kind === 'votes' ? 'votes' : 'chance';
  if (votes.shares.length === 0 || votes.margin === null) return null;
  return (
    <section aria-label="Votes of this pixel">
      <h3 className="font-semibold">
        {votes.kind === 'votes' ? 'Votes of the classifier' : 'Chances by the classifier'}
      </h3>
      <ul className="mt-1.5 space-y-1">
        {given.map(({ classId, share }) => {
          const landClass = classes.get(classId);
          return (
            <li key={classId} className="grid grid-cols-[16px_7rem_1fr_3.25rem] items-center gap-2">
              <ClassSwatch colour={landClass?.colour ?? '#888888'} position={landClass?.position ?? 0} />
              <span className="truncate" title={landClass?.name}>
                {landClass?.name ?? 'A class of old'}
              </span>
              <span aria-hidden className="h-2 rounded-sm bg-sunken">
                <span
                  className="block h-full rounded-sm border border-edge"
                  style={{ width: `${share * 100}%`, background: landClass?.colour }}
                />
              </span>
              <span className="text-right font-medium">{formatPercent(share, 1)}</span>
            </li>
          );
        })}
      </ul>
      <p className="mt-1.5 text-xs text-ink-soft">
        {nNone > 0 && `No ${noun} for the other ${nNone}. `}
        Margin {formatPercent(votes.margin, 1)}: {describeMargin(votes.margin)}. Shares say how sure the classifier is,
        not how likely it is right.
      </p>
    </section>
  );
}

function describeMargin(margin: number): string {
  if (margin < 0.1) return 'a toss-up between the first two';
  if (margin < 0.5) return 'the runner-up is not far behind';
  return 'a clear choice';
}
