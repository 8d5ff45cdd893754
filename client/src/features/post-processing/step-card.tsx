import { ArrowDown, ArrowUp, Trash2 } from 'lucide-react';
import type { PostProcessingStep, StepEffect } from '../../../../shared/contracts/post-processing.ts';
import { IconButton } from '../../components/ui/icon-button.tsx';
import { Switch } from '../../components/ui/switch.tsx';
import { formatCount, formatNumber } from '../../lib/format.ts';
import { StepFields } from './step-fields.tsx';
import { STEP_NAMES, type ClassChoice } from './step-text.ts';

interface StepCardProps {
  step: PostProcessingStep;
  place: number;
  nSteps: number;
  effect: StepEffect | undefined;
  isCounting: boolean;
  isLocked: boolean;
  classes: readonly ClassChoice[];
  layers: readonly { id: string; name: string }[];
  hasStudyArea: boolean;
  onChange: (step: PostProcessingStep) => void;
  onMove: (by: -1 | 1) => void;
  onRemove: () => void;
}

/** A step with its settings, what it changes, and its place in the order. */
export function StepCard(props: StepCardProps) {
  const { step, place, nSteps, isLocked, onChange, onMove, onRemove } = props;
  const name = STEP_NAMES[step.kind];
  return (
    <li className="rounded-lg border border-line bg-paper p-2.5">
      <div className="flex items-center gap-1">
        <Switch
          className="grow items-center"
          label={
            <span className="text-sm font-semibold">
              {place}. {name}
            </span>
          }
          isOn={step.isOn}
          isDisabled={isLocked}
          onChange={(isOn) => onChange({ ...step, isOn })}
        />
        <IconButton
          label={`Move ${name} up`}
          size="sm"
          icon={<ArrowUp />}
          disabled={isLocked || place === 1}
          onClick={() => onMove(-1)}
        />
        <IconButton
          label={`Move ${name} down`}
          size="sm"
          icon={<ArrowDown />}
          disabled={isLocked || place === nSteps}
          onClick={() => onMove(1)}
        />
        <IconButton label={`Remove ${name}`} size="sm" icon={<Trash2 />} disabled={isLocked} onClick={onRemove} />
      </div>
      {step.isOn && (
        <fieldset disabled={isLocked} className="mt-2 min-w-0">
          <legend className="sr-only">{name}</legend>
          <StepFields {...props} />
        </fieldset>
      )}
      <EffectLine {...props} />
    </li>
  );
}

function EffectLine({ step, effect, isCounting }: StepCardProps) {
  if (!step.isOn) return <p className="mt-1.5 text-xs text-ink-soft">Switched off</p>;
  if (!effect) return <p className="mt-1.5 text-xs text-ink-soft">{isCounting ? 'Counting…' : 'Not counted yet'}</p>;
  const { changedPixels, changedHa, nMerged, nLeft } = effect;
  return (
    <p className={`mt-1.5 text-xs text-ink-soft ${isCounting ? 'opacity-60' : ''}`}>
      Changes {formatCount(changedPixels, 'pixel')}, {formatNumber(changedHa, changedHa < 100 ? 1 : 0)} ha
      {nMerged !== null && ` · ${formatCount(nMerged, 'patch', 'patches')} merged`}
      {nLeft !== null && nLeft > 0 && ` · ${formatNumber(nLeft)} without a neighbour stay`}
    </p>
  );
}
