import { useQuery } from '@tanstack/react-query';
import { type Block, type BlockAgreement, blockAgreementSchema } from '../../../../shared/contracts/block.ts';
import { type Sample, sampleListSchema } from '../../../../shared/contracts/sample.ts';
import { Facts } from '../../components/layout/slip.tsx';
import { Button } from '../../components/ui/button.tsx';
import { ClassSwatch } from '../../components/ui/class-swatch.tsx';
import { ErrorState } from '../../components/ui/error-state.tsx';
import { PendingState } from '../../components/ui/pending-state.tsx';
import { sayDone } from '../../components/ui/toaster.tsx';
import { fetchJson } from '../../lib/fetch-json.ts';
import { formatCount, formatNumber, formatPercent } from '../../lib/format.ts';
import { useClasses } from '../../lib/project/classes-query.ts';
import { projectKey } from '../../lib/project/project-query.ts';
import { useSettle } from './change-blocks.ts';

export interface AgreementPartProps {
  block: Block;
  canSettle: boolean;
  onShow: (sampleIds: readonly [string, string]) => void;
}

/** How the two labellers of a block agreed, and where they did not. */
export function AgreementPart({ block, canSettle, onShow }: AgreementPartProps) {
  const { projectId, id } = block;
  const agreement = useQuery({
    queryKey: projectKey(projectId, 'blocks', 'agreement', id),
    queryFn: ({ signal }) => fetchJson(`/blocks/${id}/agreement`, blockAgreementSchema, { signal }),
  });
  const samples = useQuery({
    queryKey: projectKey(projectId, 'samples', 'list'),
    queryFn: ({ signal }) => fetchJson(`/projects/${projectId}/samples`, sampleListSchema, { signal }),
  });
  if (agreement.isPending) return <PendingState label="Loading the agreement" rows={3} />;
  if (agreement.isError) return <ErrorState error={agreement.error} isInline />;
  const { data } = agreement;
  const byId = new Map((samples.data?.samples ?? []).map((sample) => [sample.id, sample]));
  const open = data.disagreements.flatMap(({ firstSampleId, secondSampleId, pixels }) => {
    const [first, second] = [byId.get(firstSampleId), byId.get(secondSampleId)];
    return first && second && first.classId !== second.classId ? [{ first, second, pixels }] : [];
  });
  const settled = data.disagreements.length - open.length;
  return (
    <section aria-label="Agreement" className="space-y-2 border-t border-line pt-2.5">
      <h3 className="font-medium">Agreement of the two</h3>
      <Facts facts={figures(data)} />
      <p className="text-xs text-ink-soft">
        Over the pixels that samples of both cover, as both were done. Pixels of one sample are no independent answers,
        so no interval is given. Cohen 1960; Fleiss 1971.
      </p>
      {data.disagreements.length > 0 && (
        <p>
          {formatCount(open.length, 'disagreement')} open
          {settled > 0 && <span className="text-ink-soft">, {settled} settled</span>}
        </p>
      )}
      <ol className="space-y-2">
        {open.map((pair) => (
          <Disagreement
            key={`${pair.first.id} ${pair.second.id}`}
            {...pair}
            block={block}
            names={data.people.map(({ name }) => name)}
            canSettle={canSettle}
            onShow={() => onShow([pair.first.id, pair.second.id])}
          />
        ))}
      </ol>
    </section>
  );
}

function figures(agreement: BlockAgreement) {
  const [first, second] = agreement.people;
  return [
    { name: 'Pixels both cover', value: formatNumber(agreement.pixelsOfBoth) },
    { name: 'Of these the same class', value: formatPercent(agreement.rawAgreement, 1) },
    { name: 'Cohen’s kappa', value: formatNumber(agreement.cohenKappa, 3) },
    { name: 'Fleiss’ kappa', value: formatNumber(agreement.fleissKappa, 3) },
    { name: `Covered by ${first?.name} alone`, value: formatNumber(agreement.pixelsOfFirstOnly) },
    { name: `Covered by ${second?.name} alone`, value: formatNumber(agreement.pixelsOfSecondOnly) },
  ];
}

interface DisagreementProps {
  first: Sample;
  second: Sample;
  pixels: number;
  block: Block;
  names: readonly string[];
  canSettle: boolean;
  onShow: () => void;
}

function Disagreement({ first, second, pixels, block, names, canSettle, onShow }: DisagreementProps) {
  const classes = useClasses(block.projectId);
  const settle = useSettle(block.projectId, block.id);
  const keep = (kept: Sample, dropped: Sample) =>
    settle.mutate(
      {
        keep: { id: kept.id, version: kept.version },
        drop: { id: dropped.id, version: dropped.version },
      },
      { onSuccess: () => sayDone(`Sample ${kept.number} kept, sample ${dropped.number} taken off the map`) },
    );
  const side = (sample: Sample, other: Sample, name: string | undefined) => {
    const landClass = classes.data?.find(({ id }) => id === sample.classId);
    return (
      <div className="min-w-0">
        <p className="text-xs text-ink-soft">
          {name}, sample {sample.number}
        </p>
        <p className="flex items-center gap-1.5">
          {landClass && <ClassSwatch colour={landClass.colour} position={landClass.position} size="sm" />}
          {landClass?.name ?? 'Class taken away'}
        </p>
        {canSettle && (
          <Button size="sm" className="mt-1" isPending={settle.isPending} onClick={() => keep(sample, other)}>
            Keep this
          </Button>
        )}
      </div>
    );
  };
  return (
    <li className="rounded-lg border border-line p-2">
      <div className="grid grid-cols-2 gap-2">
        {side(first, second, names[0])}
        {side(second, first, names[1])}
      </div>
      <p className="mt-1 flex items-center justify-between text-xs text-ink-soft">
        {formatCount(pixels, 'pixel')} shared
        <Button size="sm" kind="ghost" onClick={onShow}>
          Show on the map
        </Button>
      </p>
      {settle.error && <ErrorState error={settle.error} isInline />}
    </li>
  );
}
