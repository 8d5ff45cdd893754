import type { PostProcessingPreview, RunPostProcessing } from '../../../../shared/contracts/post-processing.ts';
import type { Run } from '../../../../shared/contracts/run.ts';
import { Slip } from '../../components/layout/slip.tsx';
import { Button } from '../../components/ui/button.tsx';
import { Callout } from '../../components/ui/callout.tsx';
import { ProgressBar } from '../../components/ui/progress-bar.tsx';
import { sayProblem } from '../../components/ui/toaster.tsx';
import { AccuracyChange } from '../../features/post-processing/accuracy-change.tsx';
import { AddStepMenu } from '../../features/post-processing/add-step-menu.tsx';
import { AreaChangeTable } from '../../features/post-processing/area-change-table.tsx';
import { useApplySteps, useStopApplying } from '../../features/post-processing/post-processing-queries.ts';
import { RevisionList } from '../../features/post-processing/revision-list.tsx';
import { StepCard } from '../../features/post-processing/step-card.tsx';
import type { StepKind } from '../../features/post-processing/step-text.ts';
import { moveStep, type StepList } from '../../features/post-processing/use-step-list.ts';
import { useProject } from '../../lib/project/project-context.ts';

interface StepsSlipProps {
  run: Run;
  list: RunPostProcessing;
  steps: StepList;
  isChanged: boolean;
  /** False while an edit by hand lacks its reason. */
  isComplete: boolean;
  layers: readonly { id: string; name: string }[];
  preview: PostProcessingPreview | null;
  previewError: Error | null;
  isCounting: boolean;
  add: (kind: StepKind) => void;
}

/** The ordered list, what each step changes, and the button that applies it. */
export function StepsSlip(props: StepsSlipProps) {
  const { run, list, steps, isChanged, isComplete, layers, preview, previewError, isCounting, add } = props;
  const project = useProject();
  const apply = useApplySteps(project.id, run.id);
  const stop = useStopApplying(project.id);
  const job = list.revisions[0]?.job ?? null;
  const isApplying = job?.state === 'queued' || job?.state === 'running';
  const isLocked = !list.abilities.change || isApplying;
  const hasMask = layers.length > 0 || project.studyArea !== null;
  const applied = list.revisions.find(({ isApplied }) => isApplied);
  const effects = preview?.effects ?? (isChanged ? [] : (applied?.effects ?? []));
  const failed = previewError ?? null;
  return (
    <Slip
      title="Steps after mapping"
      note="Applied from top to bottom to the classifier’s own map, which is kept"
      footer={
        list.abilities.change && (
          <Button
            kind="primary"
            isPending={apply.isPending || isApplying}
            pendingLabel="Applying…"
            disabled={!isChanged || !isComplete}
            onClick={() =>
              apply.mutate({ steps: steps.steps, basedOn: list.revisions[0]?.number ?? 0 }, { onError: sayProblem })
            }
          >
            {isChanged ? 'Apply to the map' : 'Applied'}
          </Button>
        )
      }
    >
      {list.refusal && (
        <Callout tone="note" title="The map is fixed.">
          {list.refusal} To change it, start a new run.
        </Callout>
      )}
      {job && isApplying && (
        <div className="space-y-2">
          <ProgressBar
            label={job.state === 'queued' ? 'Waiting for its turn' : job.step}
            done={job.share * 100}
            total={100}
            secondsLeft={job.secondsLeft}
          />
          <Button size="sm" isPending={stop.isPending} onClick={() => stop.mutate(job.id, { onError: sayProblem })}>
            Stop
          </Button>
        </div>
      )}
      {job?.state === 'failed' && (
        <Callout tone="danger" title="The last list was not applied." isAlert>
          {job.error}
        </Callout>
      )}
      {steps.steps.length === 0 && <p className="text-ink-soft">No steps: the map is the classifier’s own.</p>}
      <ol className="space-y-2">
        {steps.steps.map((step, index) => (
          <StepCard
            key={step.id}
            {...{ step, isLocked, isCounting, layers }}
            place={index + 1}
            nSteps={steps.steps.length}
            effect={effects.find(({ stepId }) => stepId === step.id)}
            classes={run.classes}
            hasStudyArea={project.studyArea !== null}
            onChange={(next) => steps.set(steps.steps.map((one) => (one.id === step.id ? next : one)))}
            onMove={(by) => steps.set(moveStep(steps.steps, index, by))}
            onRemove={() => steps.set(steps.steps.filter(({ id }) => id !== step.id))}
          />
        ))}
      </ol>
      {!isLocked && <AddStepMenu without={hasMask ? [] : ['fill']} onAdd={add} />}
      {failed && (
        <Callout tone="beware" title="No preview." isAlert>
          {failed.message}
        </Callout>
      )}
      <section className="space-y-2 border-t border-line pt-2.5">
        <h3 className="font-semibold">{isChanged ? 'Areas, if applied' : 'Areas'}</h3>
        <AreaChangeTable areas={preview?.areas ?? list.areas} />
      </section>
      <AccuracyChange before={list.before} after={list.after} />
      {list.revisions.length > 0 && (
        <details className="border-t border-line pt-2.5">
          <summary className="cursor-pointer font-semibold">Earlier lists ({list.revisions.length})</summary>
          <div className="mt-2">
            <RevisionList
              revisions={list.revisions}
              isLocked={isLocked}
              onTake={(revision) => steps.set(revision.steps)}
            />
          </div>
        </details>
      )}
    </Slip>
  );
}
