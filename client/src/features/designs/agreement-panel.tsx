import type { Agreement, Design } from '../../../../shared/contracts/reference.ts';
import { Callout } from '../../components/ui/callout.tsx';
import { ClassSwatch } from '../../components/ui/class-swatch.tsx';
import { ErrorState } from '../../components/ui/error-state.tsx';
import { PendingState } from '../../components/ui/pending-state.tsx';
import { formatCount } from '../../lib/format.ts';
import { type AgreementRow, AgreementTable } from './agreement-table.tsx';
import { ConfusedPairs } from './confused-pairs.tsx';
import { useAgreement } from './get-agreement.ts';

export interface AgreementPanelProps {
  design: Design;
  /** Place of a class in the scheme, for its pattern. */
  positionOf: (classId: string) => number;
}

/** How far the people who interpreted a design agree: in all, by class, and which classes they do not tell apart. */
export function AgreementPanel({ design, positionOf }: AgreementPanelProps) {
  const agreement = useAgreement(design.projectId, design.id, true);
  if (agreement.isPending) return <PendingState label="Comparing the answers" rows={4} />;
  if (agreement.isError)
    return <ErrorState error={agreement.error} onRetry={() => void agreement.refetch()} isInline />;
  const { nPoints, interpreters, perClass, matrix, cautions } = agreement.data;
  if (nPoints === 0) {
    return <Callout>No point has two answers, so nothing can be said about agreement.</Callout>;
  }
  return (
    <div className="space-y-7">
      <div>
        <AgreementTable
          title="Agreement"
          isTitleHidden
          of="Figure"
          unit="Points"
          note={`${formatCount(nPoints, 'point')} with two answers or more, by ${interpreters
            .map(({ person, answered }) => `${person?.name ?? 'someone no longer here'} (${answered})`)
            .join(', ')}; whiskers are 95 % intervals over points.`}
          rows={listRows(agreement.data)}
        />
        {cautions.map((caution) => (
          <p key={caution} className="mt-2 text-sm text-ink-soft">
            {caution}
          </p>
        ))}
      </div>
      <div className="grid gap-7 xl:grid-cols-[minmax(0,3fr)_minmax(0,2fr)]">
        <AgreementTable
          title="By class"
          of="Class"
          unit="Answers"
          note="Where one answer names the class, how often another answer of the same point does."
          rows={perClass.map(({ class: one, answers, figure }) => ({
            ...{ name: one.name, colour: one.colour, figure, n: answers },
            swatch: <ClassSwatch size="sm" colour={one.colour} position={positionOf(one.id)} />,
          }))}
        />
        {matrix && <ConfusedPairs matrix={matrix} design={design} />}
      </div>
    </div>
  );
}

function listRows({ raw, cohen, fleiss, krippendorff, interpreters }: Agreement): AgreementRow[] {
  const nameOf = (place: number) => interpreters[place]?.person?.name ?? 'someone no longer here';
  return [
    { name: 'Same class (raw agreement)', figure: raw, n: raw.n },
    ...cohen.map(({ first, second, figure }) => ({
      name: `Cohen’s kappa, ${nameOf(first)} and ${nameOf(second)}`,
      ...{ figure, n: figure.n },
    })),
    { name: 'Fleiss’ kappa', figure: fleiss, n: fleiss.n },
    { name: 'Krippendorff’s alpha', figure: krippendorff, n: krippendorff.n },
  ];
}
