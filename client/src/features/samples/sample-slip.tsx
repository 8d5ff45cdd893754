import { PencilLine, Trash2 } from 'lucide-react';
import type { LandClass } from '../../../../shared/contracts/land-class.ts';
import type { Sample, SampleVersion } from '../../../../shared/contracts/sample.ts';
import { Facts, Slip } from '../../components/layout/slip.tsx';
import { Button } from '../../components/ui/button.tsx';
import { Callout } from '../../components/ui/callout.tsx';
import { ClassSwatch } from '../../components/ui/class-swatch.tsx';
import { Kbd } from '../../components/ui/kbd.tsx';
import { formatDateTime, formatSince } from '../../lib/format-date.ts';
import { formatHectares, formatNumber } from '../../lib/format.ts';
import { CONFIDENCE_TEXT } from './confidence-text.ts';
import { JudgementBlock } from './judgement-block.tsx';
import { useJudgement } from './judgement-query.ts';
import { type MeasuredScene, useMeasure } from './measure-query.ts';
import { ReviewActs } from './review-acts.tsx';
import { SampleHistory } from './sample-history.tsx';
import { SampleStateTag } from './sample-state.tsx';
import { SampleThread } from './sample-thread.tsx';
import { SpectrumBlock } from './spectrum-block.tsx';
import { rivalSeries } from './spectrum-series.ts';

export interface SampleSlipProps {
  sample: Sample;
  scene: MeasuredScene & { name: string };
  classes: readonly LandClass[];
  viewerId: string;
  isBusy: boolean;
  /** Somebody else who is changing it just now. */
  editedBy: string | null;
  /** The version whose outline is on the map, if any. */
  shownVersion: number | null;
  onShowVersion: (version: SampleVersion | null) => void;
  onRestore: (versionNumber: number) => void;
  onEdit: () => void;
  onDelete: () => void;
  onClose: () => void;
}

/** The selected sample: its spectrum, its facts, its history, and what the viewer may do with it. */
export function SampleSlip(props: SampleSlipProps) {
  const { sample, scene, classes, viewerId, isBusy, shownVersion } = props;
  const measure = useMeasure(sample.projectId, scene, sample.geometry);
  const judgement = useJudgement(sample.projectId, scene, {
    classId: sample.classId,
    geometry: sample.geometry,
    sampleId: sample.id,
  });
  const landClass = classes.find((one) => one.id === sample.classId);
  const className = landClass?.name ?? 'Class taken away';
  const author = sample.createdBy?.id === viewerId ? 'you' : (sample.createdBy?.name ?? 'someone no longer here');
  const wasChanged = sample.version > 1;
  return (
    <Slip
      title={`${className} · sample ${sample.number}`}
      mark={landClass && <ClassSwatch colour={landClass.colour} position={landClass.position} />}
      note={
        <span className="flex flex-wrap items-center gap-1.5">
          Drawn by {author}, {formatSince(sample.createdAt)} · version {sample.version}
          <SampleStateTag state={sample.state} />
        </span>
      }
      onClose={props.onClose}
      footer={
        sample.abilities.edit ? (
          <>
            <Button
              icon={<Trash2 aria-hidden />}
              onClick={props.onDelete}
              isPending={isBusy}
              aria-keyshortcuts="Delete"
            >
              Delete
            </Button>
            <Button kind="strong" icon={<PencilLine aria-hidden />} onClick={props.onEdit} aria-keyshortcuts="E">
              Change <Kbd className="border-paper/40! text-paper!">E</Kbd>
            </Button>
          </>
        ) : undefined
      }
    >
      {props.editedBy && (
        <Callout tone="beware" title={`${props.editedBy} is changing this sample.`}>
          If both of you save, the second is shown both versions.
        </Callout>
      )}
      <SpectrumBlock
        measure={measure}
        name="This sample"
        colour="var(--ink)"
        behind={(spectrum) => rivalSeries(judgement.data?.rivals ?? [], spectrum, classes)}
      />
      <Facts
        facts={[
          { name: 'Pixels (centre inside)', value: formatNumber(sample.pixelCount) },
          { name: 'Area', value: formatHectares(sample.areaHa) },
          { name: 'Confidence', value: CONFIDENCE_TEXT[sample.confidence] },
          { name: 'Scene', value: scene.name },
          ...(wasChanged ? [{ name: 'Last changed', value: formatDateTime(sample.updatedAt) }] : []),
        ]}
      />
      <JudgementBlock judgement={judgement} classes={classes} />
      {sample.note && <p className="border-t border-line pt-2.5 whitespace-pre-line">{sample.note}</p>}
      <ReviewActs sample={sample} />
      {!sample.abilities.edit && (
        <p className="border-t border-line pt-2.5 text-ink-soft">
          {author === 'you' ? 'Your roles here no longer draw samples.' : `Only ${author} or the lead can change it.`}
        </p>
      )}
      <SampleThread key={`thread ${sample.id}`} sample={sample} viewerId={viewerId} />
      <SampleHistory
        key={sample.id}
        sample={sample}
        classes={classes}
        viewerId={viewerId}
        isBusy={isBusy}
        shownVersion={shownVersion}
        onShowVersion={props.onShowVersion}
        onRestore={props.onRestore}
      />
    </Slip>
  );
}
