import { useState } from 'react';
import type { LandClass } from '../../../../shared/contracts/land-class.ts';
import { confidenceSchema } from '../../../../shared/contracts/sample.ts';
import { Facts, Slip } from '../../components/layout/slip.tsx';
import { Button } from '../../components/ui/button.tsx';
import { Callout } from '../../components/ui/callout.tsx';
import { ClassSwatch } from '../../components/ui/class-swatch.tsx';
import { ErrorState } from '../../components/ui/error-state.tsx';
import { Field } from '../../components/ui/field.tsx';
import { Kbd } from '../../components/ui/kbd.tsx';
import { Segmented } from '../../components/ui/segmented.tsx';
import { Select } from '../../components/ui/select.tsx';
import { Slider } from '../../components/ui/slider.tsx';
import { TextArea } from '../../components/ui/text-input.tsx';
import { formatSince } from '../../lib/format-date.ts';
import { formatHectares, formatNumber } from '../../lib/format.ts';
import type { ProblemError } from '../../lib/problem-error.ts';
import { CONFIDENCE_TEXT } from './confidence-text.ts';
import { type Draft, isUnchanged } from './draft.ts';
import { JudgementBlock } from './judgement-block.tsx';
import { useJudgement } from './judgement-query.ts';
import type { MeasuredScene, useMeasure } from './measure-query.ts';
import { RefusalNote } from './refusal-note.tsx';
import { SpectrumBlock } from './spectrum-block.tsx';
import { rivalSeries } from './spectrum-series.ts';

export interface DraftSlipProps {
  draft: Draft;
  classes: readonly LandClass[];
  measure: ReturnType<typeof useMeasure>;
  projectId: string;
  scene: MeasuredScene;
  /** The drawing comes from before a reload. */
  isFromBefore: boolean;
  isSaving: boolean;
  /** How like the pixel it grew from its pixels are; null for a drawing by hand. */
  growth: { distance: number; isGrowing: boolean; onDistance: (distance: number) => void } | null;
  error: ProblemError | null;
  onChange: (draft: Draft) => void;
  onSave: () => void;
  onDiscard: () => void;
}

/** A drawing not saved yet: what is inside, its class, confidence and note. */
export function DraftSlip(props: DraftSlipProps) {
  const {
    draft,
    classes,
    measure,
    projectId,
    scene,
    isFromBefore,
    isSaving,
    growth,
    error,
    onChange,
    onSave,
    onDiscard,
  } = props;
  const landClass = classes.find((one) => one.id === draft.classId);
  const refusal = measure.data?.refusal ?? null;
  const isSame = isUnchanged(draft);
  const judgement = useJudgement(
    projectId,
    scene,
    { classId: draft.classId, geometry: draft.geometry, sampleId: draft.id },
    measure.data !== undefined && refusal === null,
  );
  return (
    <Slip
      title={draft.base ? `Sample ${draft.base.number}, changing` : 'New sample'}
      mark={landClass && <ClassSwatch colour={landClass.colour} position={landClass.position} />}
      note={`Not saved yet · begun ${formatSince(draft.startedAt)}`}
      footer={
        <>
          <Button onClick={onDiscard}>
            {draft.base ? 'Leave as it was' : 'Discard'} <Kbd>Esc</Kbd>
          </Button>
          <Button
            kind="strong"
            onClick={onSave}
            isPending={isSaving}
            pendingLabel="Saving…"
            disabled={refusal !== null}
            aria-keyshortcuts="Enter"
          >
            {draft.base ? 'Save changes' : 'Save sample'} ↵
          </Button>
        </>
      }
    >
      {growth && <GrowSlider key={growth.distance} {...growth} />}
      {isFromBefore && (
        <Callout tone="beware" title="Kept from before.">
          This drawing was not saved when the page was left. Save it or discard it.
        </Callout>
      )}
      <SpectrumBlock
        measure={measure}
        name="This drawing"
        colour="var(--ink)"
        behind={(spectrum) => rivalSeries(judgement.data?.rivals ?? [], spectrum, classes)}
      />
      {refusal && <RefusalNote refusal={refusal} />}
      {error && <ErrorState error={error} isInline />}
      {measure.data && !refusal && (
        <>
          <MeasureFacts measure={measure.data} isOld={measure.isPlaceholderData} />
          <JudgementBlock judgement={judgement} classes={classes} />
        </>
      )}
      <div className="space-y-3 border-t border-line pt-3">
        <Field label="Class">
          <Select
            value={draft.classId}
            onChange={(classId) => onChange({ ...draft, classId })}
            options={classes.map((one) => ({
              value: one.id,
              label: one.name,
              mark: <ClassSwatch colour={one.colour} position={one.position} />,
            }))}
          />
        </Field>
        <div>
          <p className="mb-1 text-sm font-medium">Confidence</p>
          <Segmented
            label="Confidence"
            value={draft.confidence}
            onChange={(confidence) => onChange({ ...draft, confidence })}
            options={confidenceSchema.options.map((value) => ({ value, label: CONFIDENCE_TEXT[value] }))}
          />
        </div>
        <Field label="Note" isOptional>
          <TextArea
            rows={2}
            maxLength={2_000}
            value={draft.note}
            placeholder="What was seen, and how it is known"
            onChange={(event) => onChange({ ...draft, note: event.target.value })}
            onKeyDown={(event) => {
              if (event.key === 'Enter' && (event.ctrlKey || event.metaKey)) onSave();
            }}
          />
        </Field>
      </div>
      {draft.base && isSame && <p className="text-xs text-ink-soft">Nothing is changed yet.</p>}
    </Slip>
  );
}

/** How far from the first pixel's spectrum a pixel may be. */
function GrowSlider({ distance, isGrowing, onDistance }: NonNullable<DraftSlipProps['growth']>) {
  const [shown, setShown] = useState(distance);
  return (
    <div aria-busy={isGrowing} className={isGrowing ? 'opacity-60' : undefined}>
      <p className="text-sm font-medium">
        Grown to {formatNumber(shown, 2)} σ{' '}
        <span className="font-normal text-ink-soft">from the pixel pressed, over all bands</span>
      </p>
      <Slider
        value={[shown]}
        onChange={([next = shown]) => setShown(next)}
        onCommit={([next = shown]) => onDistance(next)}
        min={0.02}
        max={1.5}
        step={0.02}
        labels={['Distance from the pixel pressed, standard deviations']}
        formatValue={(value) => formatNumber(value, 2)}
      />
    </div>
  );
}

/** How much an outline holds. */
function MeasureFacts({ measure, isOld }: { measure: MeasureData; isOld: boolean }) {
  const facts = [
    { name: 'Pixels (centre inside)', value: formatNumber(measure.pixelCount) },
    ...(measure.nodataPixels > 0
      ? [{ name: 'Without data, left out', value: formatNumber(measure.nodataPixels) }]
      : []),
    { name: 'Area', value: formatHectares(measure.areaHa) },
  ];
  return (
    <div aria-busy={isOld} className={isOld ? 'opacity-60' : undefined}>
      <Facts facts={facts} />
    </div>
  );
}

type MeasureData = NonNullable<ReturnType<typeof useMeasure>['data']>;
